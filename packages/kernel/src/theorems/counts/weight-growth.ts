import { exactValue } from '@stillroom/shared/expression';
import type { Expression } from '@stillroom/shared/expression';
import type { Rational } from '../../exact/index.ts';
import { compare, divide, ONE, rational, sign, ZERO } from '../../exact/index.ts';
import type { Polynomial } from '../polynomials/polynomial.ts';
import {
  add,
  degree,
  multiply,
  polynomial,
  scale,
  signAtInfinity,
  subtract,
} from '../polynomials/polynomial.ts';

/** A quotient of polynomials in n that a weight equals for all large n; the denominator is not 0. */
interface Fraction {
  readonly above: Polynomial;
  readonly below: Polynomial;
}

/** How a weight θ(n) behaves for large n. */
export type WeightGrowth =
  | { readonly kind: 'unbounded' }
  | { readonly kind: 'vanishing' }
  /** θ(n) = limit + slope/n + O(1/n²). */
  | { readonly kind: 'level'; readonly limit: Rational; readonly slope: Rational };

/** Exact values of constants by name. */
export type ExactNames = (name: string) => Rational | null;

/**
 * Reads the growth of a weight off its expression: sums, products, quotients, whole powers, `min` and `max` of n and of
 * constants with exact values, followed exactly as rational functions of n. Null for anything else.
 */
export function weightGrowth(weight: Expression, names: ExactNames): WeightGrowth | null {
  const fraction = fractionOf(weight, names);
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

/** The quotient that an expression equals for all large n; null where it is none. */
export function fractionOf(expression: Expression, names: ExactNames): Fraction | null {
  const constant = exactValue(expression, (name) => (name === 'n' ? null : names(name)));
  if (constant !== null) return { above: polynomial(constant), below: polynomial(ONE) };
  switch (expression.kind) {
    case 'name':
      return expression.name === 'n' ? { above: polynomial(ZERO, ONE), below: polynomial(ONE) } : null;
    case 'negate': {
      const of = fractionOf(expression.of, names);
      return of && { above: scale(of.above, rational(-1n)), below: of.below };
    }
    case 'binary':
      return binaryFraction(expression, names);
    case 'call':
      return callFraction(expression, names);
    default:
      return null;
  }
}

function binaryFraction(
  expression: Extract<Expression, { kind: 'binary' }>,
  names: ExactNames,
): Fraction | null {
  if (expression.operator === '^') return powerFraction(expression, names);
  const left = fractionOf(expression.left, names);
  const right = fractionOf(expression.right, names);
  if (left === null || right === null) return null;
  switch (expression.operator) {
    case '+':
    case '-': {
      const second =
        expression.operator === '+'
          ? right
          : { above: scale(right.above, rational(-1n)), below: right.below };
      return {
        above: add(multiply(left.above, second.below), multiply(second.above, left.below)),
        below: multiply(left.below, second.below),
      };
    }
    case '*':
      return { above: multiply(left.above, right.above), below: multiply(left.below, right.below) };
    case '/':
      return right.above.length === 0
        ? null
        : { above: multiply(left.above, right.below), below: multiply(left.below, right.above) };
    default:
      return null;
  }
}

function powerFraction(
  expression: Extract<Expression, { kind: 'binary' }>,
  names: ExactNames,
): Fraction | null {
  const base = fractionOf(expression.left, names);
  const exponent = exactValue(expression.right, names);
  if (base === null || exponent === null || exponent.denominator !== 1n) return null;
  const times = Number(exponent.numerator);
  if (times < 0 || times > 20) return null;
  let result: Fraction = { above: polynomial(ONE), below: polynomial(ONE) };
  for (let k = 0; k < times; k++) {
    result = { above: multiply(result.above, base.above), below: multiply(result.below, base.below) };
  }
  return result;
}

function callFraction(expression: Extract<Expression, { kind: 'call' }>, names: ExactNames): Fraction | null {
  if (expression.name !== 'min' && expression.name !== 'max') return null;
  const parts = expression.arguments.map((part) => fractionOf(part, names));
  let chosen: Fraction | null = null;
  for (const part of parts) {
    if (part === null) return null;
    if (chosen === null) {
      chosen = part;
      continue;
    }
    const order = orderAtInfinity(part, chosen);
    if (expression.name === 'min' ? order < 0 : order > 0) chosen = part;
  }
  return chosen;
}

/** The sign of a − b for all large n. */
function orderAtInfinity(a: Fraction, b: Fraction): number {
  const difference = subtract(multiply(a.above, b.below), multiply(b.above, a.below));
  return signAtInfinity(difference, 1) * sign(a.below.at(-1)!) * sign(b.below.at(-1)!);
}
