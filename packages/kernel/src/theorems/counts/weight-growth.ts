import type { Expression } from '@stillroom/shared/expression';
import type { Rational } from '../../exact/index.ts';
import { compare, divide, ONE, ZERO } from '../../exact/index.ts';
import { degree, scale, subtract } from '../polynomials/polynomial.ts';
import type { ExactNames } from './fraction.ts';
import { fractionOf } from './fraction.ts';

/** How a weight θ(n) behaves for large n. */
export type WeightGrowth =
  | { readonly kind: 'unbounded' }
  | { readonly kind: 'vanishing' }
  /** θ(n) = limit + slope/n + O(1/n²). */
  | { readonly kind: 'level'; readonly limit: Rational; readonly slope: Rational };

/**
 * Reads the growth of a weight off its expression: sums, products, quotients, whole powers, `min` and `max` of n and of
 * constants with exact values, followed exactly as rational functions of n. Null for anything else.
 */
export function weightGrowth(weight: Expression, names: ExactNames): WeightGrowth | null {
  const fraction = fractionOf(weight, 'n', names);
  if (fraction === null || fraction.above.length === 0) return null;
  const { above, below } = fraction;
  const order = degree(above) - degree(below);
  if (order > 0) return { kind: 'unbounded' };
  if (order < 0) return { kind: 'vanishing' };
  const limit = divide(above.at(-1)!, below.at(-1)!);
  const rest = subtract(above, scale(below, limit));
  const slope =
    rest.length > 0 && degree(rest) === degree(below) - 1 ? divide(rest.at(-1)!, below.at(-1)!) : ZERO;
  return { kind: 'level', limit, slope };
}

/**
 * Whether Σ_n ∏_{j≤n} c/θ(j) is finite, for a given c: by the ratio of successive terms, and where that tends to 1 by the
 * test of Raabe: the terms fall like n^{−slope/limit}. Null where neither test decides.
 */
export function isSummable(
  growth: WeightGrowth,
  c: { readonly exact: Rational | null; readonly near: number },
): boolean | null {
  if (growth.kind === 'unbounded') return true;
  if (growth.kind === 'vanishing') return false;
  if (c.exact === null) {
    const limit = Number(growth.limit.numerator) / Number(growth.limit.denominator);
    if (c.near < limit * (1 - 1e-9)) return true;
    return c.near > limit * (1 + 1e-9) ? false : null;
  }
  const order = compare(c.exact, growth.limit);
  if (order !== 0) return order < 0;
  // Equal to the first order; an exponent of exactly 1 diverges as well (the test of Gauss).
  return compare(divide(growth.slope, growth.limit), ONE) > 0;
}
