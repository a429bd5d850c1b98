import type { LinearCondition, Rational } from '../../exact/index.ts';
import { clearDenominators, isZero, rational, solveLinear } from '../../exact/index.ts';

/** A condition on rational unknowns: Σ coefficients · unknowns (= 0, or ≥ 1 for a strict inequality up to scale). */
export interface Condition {
  readonly coefficients: readonly Rational[];
  readonly strict: boolean;
}

/** Whether homogeneous conditions on unknowns of any sign can be met; an error where that takes too long. */
export function feasible(unknowns: number, conditions: readonly Condition[]): boolean {
  const rows = conditions.map(({ coefficients, strict }): LinearCondition => {
    const { integers } = clearDenominators(coefficients);
    return {
      terms: integers.flatMap((value, k) => (value === 0n ? [] : [[k, value] as const])),
      relation: strict ? '>=' : '=',
      right: strict ? 1n : 0n,
    };
  });
  const outcome = solveLinear({ variables: unknowns, free: () => true, conditions: rows });
  if (outcome.kind === 'unfinished') throw new Error('a linear programme was too long');
  return outcome.kind === 'feasible';
}

/** The unit vector of one unknown, times a sign. */
export function unit(unknowns: number, index: number, sense: 1 | -1): Rational[] {
  return Array.from({ length: unknowns }, (_, k) => rational(k === index ? BigInt(sense) : 0n));
}

/** Whether all coefficients are 0. */
export function vanishes(coefficients: readonly Rational[]): boolean {
  return coefficients.every(isZero);
}
