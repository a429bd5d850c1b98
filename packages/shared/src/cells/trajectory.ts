import * as z from 'zod/mini';
import type { ResultUnits } from './network.ts';
import { cellReference, finite } from './settings.ts';

const positive = finite.check(z.gt(0));
const values = z.record(z.string(), finite);

/** An event of a cell, written like one of the network's: `when` an expression, `set` numbers or expressions by name. */
const trajectoryEvent = z.strictObject({
  when: z.string(),
  set: z.record(z.string(), z.union([finite, z.string()])),
});

/** Settings of a trajectory cell; numbers in the units of the network's text. */
export const trajectorySettings = z
  .strictObject({
    network: cellReference,
    /** The end of the course; by default the last of `times`. */
    until: z.optional(positive),
    /** How many equally spaced times the result has, both ends included; 201 by default. */
    points: z.optional(z.int().check(z.gte(2), z.lte(100_000))),
    /** The times of the result, ascending, in place of `points`. */
    times: z.optional(z.array(finite.check(z.gte(0))).check(z.minLength(1), z.maxLength(100_000))),
    /** "auto" begins with the method for non-stiff systems and changes where that pays. */
    method: z.optional(z.enum(['auto', 'stiff', 'nonstiff'])),
    /** Relative tolerance of one step, 1e-6 by default. */
    rtol: z.optional(finite.check(z.gte(1e-13), z.lte(0.1))),
    /** Absolute tolerance of one step, 1e-12 times the larger of 1 and the largest start by default. */
    atol: z.optional(positive),
    /** Values that replace those of the text, by name of a constant. */
    constants: z.optional(values),
    /** Values that replace those of the text, by name of a species. */
    start: z.optional(values),
    /** Events besides those of the network. */
    events: z.optional(z.array(trajectoryEvent)),
    /** Constants by which the course is differentiated; true for all that have a value. */
    sensitivities: z.optional(z.union([z.boolean(), z.array(z.string())])),
  })
  .check(
    z.refine(
      ({ until, times }) => until !== undefined || times !== undefined,
      'needs until, the end of the course (or times, a list)',
    ),
  );

export type TrajectorySettings = z.infer<typeof trajectorySettings>;

/** What the computation of a course took. */
export interface TrajectoryStatistics {
  readonly steps: number;
  readonly rejected: number;
  /** Evaluations of the right-hand side. */
  readonly rhs: number;
  readonly jacobians: number;
  readonly factorizations: number;
  /** The methods that made the steps, joined by ", then ". */
  readonly method: string;
}

/** A course of the rate equations. Lists have one number for each of `times`. */
export interface TrajectoryResult {
  readonly times: readonly number[];
  readonly species: Readonly<Record<string, readonly number[]>>;
  /** The outputs (`let` of species or t); null where the expression has no value. */
  readonly derived: Readonly<Record<string, readonly (number | null)[]>>;
  /** Derivative of each species by each constant asked for: sensitivities[constant][species]. */
  readonly sensitivities?: Readonly<Record<string, Readonly<Record<string, readonly number[]>>>>;
  /** Events that fired: when, and which (the network's in order of writing, then the cell's). */
  readonly fired?: readonly { readonly time: number; readonly event: number }[];
  readonly statistics: TrajectoryStatistics;
  /**
   * Largest departure of a conservation law from its total over all steps, relative to Σ |coefficient · species|; null
   * where there is no law.
   */
  readonly conservationDrift: number | null;
  readonly ended: 'complete' | 'stopped';
  /** Why a course stopped before its end, for the reader; its last time is where. */
  readonly why?: string;
  readonly units: ResultUnits | null;
}
