import { rational } from '../network/index.ts';
import type { Span } from '../expression/syntax.ts';
import { Failure } from './failure.ts';

/** A coefficient in lowest terms; both below 2^53 and positive. */
export interface Coefficient {
  readonly numerator: number;
  readonly denominator: number;
}

/** The sum of two coefficients in lowest terms. Throws Failure at the second where it is beyond 2^53. */
export function sumOfCoefficients(a: Coefficient, b: Coefficient & Span): Coefficient {
  if (a.denominator === 1 && b.denominator === 1 && Number.isSafeInteger(a.numerator + b.numerator)) {
    return { numerator: a.numerator + b.numerator, denominator: 1 };
  }
  const fraction = (x: Coefficient) => rational.quotient(BigInt(x.numerator), BigInt(x.denominator));
  const sum = rational.add(fraction(a), fraction(b));
  const numerator = Number(sum.numerator);
  const denominator = Number(sum.denominator);
  if (!Number.isSafeInteger(numerator) || !Number.isSafeInteger(denominator)) {
    throw new Failure(b.from, b.to, 'The coefficients of one species add up to more than 2^53.');
  }
  return { numerator, denominator };
}
