import type { Witness } from '@stillroom/shared/cells';
import type { Rational } from '../../exact/index.ts';
import {
  add,
  fromDouble,
  integerForResult,
  multiply,
  rational,
  rationalForResult,
  ZERO,
} from '../../exact/index.ts';
import type { Interval } from '../../intervals/index.ts';
import { disjoint, verifiedBox } from '../../intervals/index.ts';
import type { TheoremContext } from '../context.ts';
import { asDoubles, intervalSystem } from './mass-action-system.ts';
import type { MassActionSystem } from './mass-action-system.ts';
import { polish } from './relax.ts';

/** Exact constants and totals with disjoint boxes, each proven to hold exactly one positive steady state. */
export interface VerifiedStates {
  readonly constants: readonly Rational[];
  readonly totals: readonly Rational[];
  readonly boxes: readonly (readonly Interval[])[];
}

/** Significant binary digits that constants and states are rounded to, so that witnesses can be read. */
const DIGITS = 20;

/** A double rounded to a few binary digits. */
export function shortened(value: number): number {
  if (value === 0 || !Number.isFinite(value)) return value;
  let scale = 1;
  while (Math.abs(value) * scale < 2 ** (DIGITS - 1)) scale *= 2;
  while (Math.abs(value) * scale >= 2 ** DIGITS) scale /= 2;
  return Math.round(value * scale) / scale;
}

/**
 * Verifies approximate steady states of one class. The totals are those of the first state, shortened; every candidate is
 * polished for them and kept when a box around it is proven and lies apart from the boxes before.
 */
export function verifyStates(
  system: MassActionSystem,
  constants: readonly Rational[],
  candidates: readonly (readonly number[])[],
  givenTotals?: readonly Rational[],
): VerifiedStates | null {
  const first = candidates[0];
  if (first === undefined) return null;
  const totals = givenTotals ?? exactTotals(system, first.map(shortened));
  const equations = intervalSystem(system, constants, totals);
  const numbers = asDoubles(constants);
  const boxes: Interval[][] = [];
  for (const candidate of candidates) {
    const state = polish(system, numbers, candidate, asDoubles(totals));
    const box = state && verifiedBox(equations, state);
    if (box !== null && boxes.every((other) => apart(box, other))) boxes.push(box);
  }
  return { constants, totals, boxes };
}

/** W x for a state of doubles, exactly. */
export function exactTotals(system: MassActionSystem, x: readonly number[]): Rational[] {
  return system.laws.map((law) =>
    law.reduce(
      (sum, weight, i) => (weight === 0n ? sum : add(sum, multiply(rational(weight), fromDouble(x[i]!)))),
      ZERO,
    ),
  );
}

/** Whether two boxes have no common point. */
export function apart(a: readonly Interval[], b: readonly Interval[]): boolean {
  return a.some((side, i) => disjoint(side, b[i]!));
}

/** Verified states as evidence. */
export function statesWitness(context: TheoremContext, states: VerifiedStates): Witness {
  const { laws } = context.memo('law names', () => ({
    laws: context.lawBasis.map((law) => {
      const entries: Record<string, number | string> = {};
      law.forEach((weight, i) => {
        if (weight !== 0n) entries[context.species[i]!] = integerForResult(weight);
      });
      return entries;
    }),
  }));
  return {
    kind: 'states',
    constants: Object.fromEntries(
      states.constants.map((constant, arrow) => [
        String(context.reactionOf(arrow)),
        rationalForResult(constant),
      ]),
    ),
    totals: laws.map((law, i) => ({ law, value: rationalForResult(states.totals[i]!) })),
    boxes: states.boxes.map((box) =>
      Object.fromEntries(box.map(({ low, high }, i) => [context.species[i]!, [low, high] as const])),
    ),
  };
}
