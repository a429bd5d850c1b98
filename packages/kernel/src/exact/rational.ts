import type { Rational } from '@stillroom/shared/network';
import { absolute, gcd, integerForResult } from './integers.ts';

export type { Rational };

export const ZERO: Rational = Object.freeze({ numerator: 0n, denominator: 1n });
export const ONE: Rational = Object.freeze({ numerator: 1n, denominator: 1n });

/** numerator / denominator in lowest terms; a zero denominator is a caller's mistake. */
export function rational(numerator: bigint, denominator = 1n): Rational {
  if (denominator === 0n) throw new RangeError('A rational number needs a denominator other than 0.');
  if (denominator === 1n) return { numerator, denominator };
  const common = gcd(numerator, denominator);
  const scale = denominator < 0n ? -common : common;
  return { numerator: numerator / scale, denominator: denominator / scale };
}

/** The exact value of a finite double, which is always a rational with a power of two below. */
export function fromDouble(value: number): Rational {
  if (!Number.isFinite(value)) throw new RangeError(`${value} has no exact value.`);
  if (Number.isInteger(value)) return rational(BigInt(value));
  let scaled = value;
  let doublings = 0;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    doublings++;
  }
  return rational(BigInt(scaled), 1n << BigInt(doublings));
}

/** Reads "3", "-3/2", "0.25" or "1e-3" exactly; null for anything else. */
export function parseRational(text: string): Rational | null {
  const fraction = /^\s*([+-]?\d+)\s*\/\s*(\d+)\s*$/.exec(text);
  if (fraction) {
    const denominator = BigInt(fraction[2]!);
    return denominator === 0n ? null : rational(BigInt(fraction[1]!), denominator);
  }
  const decimal = /^\s*([+-]?)(\d+)(?:\.(\d*))?(?:[eE]([+-]?\d{1,4}))?\s*$/.exec(text);
  if (!decimal) return null;
  const digits = decimal[3] ?? '';
  const magnitude = BigInt(decimal[2]! + digits);
  const exponent = Number(decimal[4] ?? 0) - digits.length;
  const numerator = decimal[1] === '-' ? -magnitude : magnitude;
  return exponent >= 0
    ? rational(numerator * 10n ** BigInt(exponent))
    : rational(numerator, 10n ** BigInt(-exponent));
}

/** "3", "-3/2". */
export function formatRational(a: Rational): string {
  return a.denominator === 1n ? a.numerator.toString() : `${a.numerator}/${a.denominator}`;
}

/** As results carry it: a number for integers up to 2^53 − 1, otherwise an exact string. */
export function rationalForResult(a: Rational): number | string {
  return a.denominator === 1n ? integerForResult(a.numerator) : formatRational(a);
}

/** The nearest double up to one rounding of each of numerator and denominator beyond 2^53; never overflows early. */
export function toDouble(a: Rational): number {
  const numerator = Number(a.numerator);
  const denominator = Number(a.denominator);
  if (Number.isFinite(numerator) && Number.isFinite(denominator)) return numerator / denominator;
  const bits = BigInt(
    Math.max(0, absolute(a.numerator).toString(2).length, a.denominator.toString(2).length) - 1000,
  );
  return Number(a.numerator >> bits) / Number(a.denominator >> bits || 1n);
}

/** a + b. */
export function add(a: Rational, b: Rational): Rational {
  if (a.denominator === b.denominator) return rational(a.numerator + b.numerator, a.denominator);
  return rational(a.numerator * b.denominator + b.numerator * a.denominator, a.denominator * b.denominator);
}

/** a − b. */
export function subtract(a: Rational, b: Rational): Rational {
  return add(a, negate(b));
}

/** a · b. */
export function multiply(a: Rational, b: Rational): Rational {
  return rational(a.numerator * b.numerator, a.denominator * b.denominator);
}

/** a / b; dividing by zero is a caller's mistake. */
export function divide(a: Rational, b: Rational): Rational {
  return rational(a.numerator * b.denominator, a.denominator * b.numerator);
}

/** −a. */
export function negate(a: Rational): Rational {
  return { numerator: -a.numerator, denominator: a.denominator };
}

/** a^exponent for an integer exponent of either sign. */
export function power(a: Rational, exponent: number): Rational {
  const size = BigInt(Math.abs(exponent));
  const raised = { numerator: a.numerator ** size, denominator: a.denominator ** size };
  return exponent >= 0 ? raised : rational(raised.denominator, raised.numerator);
}

/** −1, 0 or 1. */
export function sign(a: Rational): -1 | 0 | 1 {
  return a.numerator > 0n ? 1 : a.numerator < 0n ? -1 : 0;
}

/** −1, 0 or 1 as a is below, equal to or above b. */
export function compare(a: Rational, b: Rational): -1 | 0 | 1 {
  const left = a.numerator * b.denominator;
  const right = b.numerator * a.denominator;
  return left < right ? -1 : left > right ? 1 : 0;
}

/** Whether a = b; both are in lowest terms, so parts are compared. */
export function equals(a: Rational, b: Rational): boolean {
  return a.numerator === b.numerator && a.denominator === b.denominator;
}

/** Whether a = 0. */
export function isZero(a: Rational): boolean {
  return a.numerator === 0n;
}
