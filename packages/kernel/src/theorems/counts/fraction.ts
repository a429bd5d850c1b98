import { exactValue } from '@stillroom/shared/expression';
import type { Expression } from '@stillroom/shared/expression';
import type { Rational } from '../../exact/index.ts';
import { absolute, divide, ONE, rational, sign, ZERO } from '../../exact/index.ts';
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

/** A quotient of polynomials in one unknown; the denominator is not 0. */
export interface Fraction {
  readonly above: Polynomial;
  readonly below: Polynomial;
  /** The expression equals it for all unknowns above this bound (0 without `min` and `max`). */
  readonly from: number;
}

/** Exact values of constants by name. */
export type ExactNames = (name: string) => Rational | null;

/**
 * Follows an expression in one unknown exactly as a rational function: sums, products, quotients, whole powers, and `min`
 * and `max`, whose choice is settled beyond a bound on all roots (Cauchy 1829). Null for anything else.
 */
export function fractionOf(expression: Expression, unknown: string, names: ExactNames): Fraction | null {
  const constant = exactValue(expression, (name) => (name === unknown ? null : names(name)));
  if (constant !== null) return constantFraction(constant);
  switch (expression.kind) {
    case 'name':
      return expression.name === unknown
        ? { above: polynomial(ZERO, ONE), below: polynomial(ONE), from: 0 }
        : null;
    case 'negate': {
      const of = fractionOf(expression.of, unknown, names);
      return of && { ...of, above: scale(of.above, rational(-1n)) };
    }
    case 'binary':
      return binaryFraction(expression, unknown, names);
    case 'call':
      return callFraction(expression, unknown, names);
    default:
      return null;
  }
}

/** A constant. */
export function constantFraction(value: Rational): Fraction {
  return { above: polynomial(value), below: polynomial(ONE), from: 0 };
}

/** f + g. */
export function addFractions(f: Fraction, g: Fraction): Fraction {
  return {
    above: add(multiply(f.above, g.below), multiply(g.above, f.below)),
    below: multiply(f.below, g.below),
    from: Math.max(f.from, g.from),
  };
}

/** f · g. */
export function multiplyFractions(f: Fraction, g: Fraction): Fraction {
  return {
    above: multiply(f.above, g.above),
    below: multiply(f.below, g.below),
    from: Math.max(f.from, g.from),
  };
}

/** All real roots of a polynomial that is not 0 lie below this bound in size (Cauchy 1829). */
export function rootBound(p: Polynomial): number {
  const lead = p.at(-1)!;
  let largest = 0;
  for (const coefficient of p.slice(0, -1)) {
    const { numerator, denominator } = divide(coefficient, lead);
    largest = Math.max(largest, Number(absolute(numerator)) / Number(denominator));
  }
  return 1 + largest;
}

function binaryFraction(
  expression: Extract<Expression, { kind: 'binary' }>,
  unknown: string,
  names: ExactNames,
): Fraction | null {
  if (expression.operator === '^') return powerFraction(expression, unknown, names);
  const left = fractionOf(expression.left, unknown, names);
  const right = fractionOf(expression.right, unknown, names);
  if (left === null || right === null) return null;
  switch (expression.operator) {
    case '+':
      return addFractions(left, right);
    case '-':
      return addFractions(left, { ...right, above: scale(right.above, rational(-1n)) });
    case '*':
      return multiplyFractions(left, right);
    case '/':
      return right.above.length === 0
        ? null
        : multiplyFractions(left, { above: right.below, below: right.above, from: right.from });
    default:
      return null;
  }
}

function powerFraction(
  expression: Extract<Expression, { kind: 'binary' }>,
  unknown: string,
  names: ExactNames,
): Fraction | null {
  const base = fractionOf(expression.left, unknown, names);
  const exponent = exactValue(expression.right, names);
  if (base === null || exponent === null || exponent.denominator !== 1n) return null;
  const times = Number(exponent.numerator);
  if (times < 0 || times > 20) return null;
  let result = constantFraction(ONE);
  for (let k = 0; k < times; k++) result = multiplyFractions(result, base);
  return result;
}

function callFraction(
  expression: Extract<Expression, { kind: 'call' }>,
  unknown: string,
  names: ExactNames,
): Fraction | null {
  if (expression.name !== 'min' && expression.name !== 'max') return null;
  let chosen: Fraction | null = null;
  for (const argument of expression.arguments) {
    const part = fractionOf(argument, unknown, names);
    if (part === null) return null;
    if (chosen === null) {
      chosen = part;
      continue;
    }
    const difference = subtract(multiply(part.above, chosen.below), multiply(chosen.above, part.below));
    const order: number =
      signAtInfinity(difference, 1) * sign(part.below.at(-1)!) * sign(chosen.below.at(-1)!);
    const settled = Math.max(
      part.from,
      chosen.from,
      ...[difference, part.below, chosen.below].filter((p) => degree(p) > 0).map(rootBound),
    );
    const better: boolean = expression.name === 'min' ? order < 0 : order > 0;
    chosen = { ...(better ? part : chosen), from: settled };
  }
  return chosen;
}
