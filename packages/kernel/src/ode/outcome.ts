import type { Counters } from './methods/method.ts';

/** Why a course ended before its time. */
export type StopReason =
  /** The step size fell below what the time can resolve. */
  | { readonly kind: 'step too small' }
  /** A component grows without bound. */
  | { readonly kind: 'growth'; readonly component: number; readonly value: number }
  /** No step, however small, gives finite numbers. */
  | { readonly kind: 'not finite' }
  | { readonly kind: 'too many steps'; readonly limit: number; readonly stiff: boolean }
  /** Events set each other off without end at one time. */
  | { readonly kind: 'event cascade' }
  /** How the time of an event moves with the constants cannot be told, so that sensitivities end there. */
  | { readonly kind: 'sensitivities end' }
  /** The caller's checkpoint said so. */
  | { readonly kind: 'stopped from outside' };

/** Thrown by a checkpoint while something is prepared, to end the work. */
export class PreparationStopped extends Error {
  constructor() {
    super('The run was ended before the course began.');
    this.name = 'PreparationStopped';
  }
}

export interface Statistics extends Readonly<Counters> {
  readonly steps: number;
  readonly rejected: number;
  /** Names of the methods that made steps, in order of first use. */
  readonly methods: readonly string[];
}

/** How a course ended. Trouble in the numbers is an outcome, not an exception. */
export interface Outcome {
  /** The time reached. */
  readonly time: number;
  /** Null when the course is complete. */
  readonly stop: StopReason | null;
  readonly statistics: Statistics;
}
