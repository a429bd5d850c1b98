import { absolute, formatRational, gcd, multiply, ONE, power, rational } from '../exact/index.ts';
import type { Rational } from '../exact/index.ts';

/** One factor of a product of powers: a positive integer base and an exponent of either sign. */
export interface Power {
  readonly base: bigint;
  readonly exponent: bigint;
}

/**
 * Whether a product of powers of positive integers is 1, for exponents of any size: the bases are refined into pairwise
 * coprime ones by greatest common divisors, on which every exponent must be 0 (Bach, Driscoll, Shallit 1993).
 */
export function productIsOne(powers: readonly Power[]): boolean {
  let parts = powers.filter(({ base, exponent }) => base !== 1n && exponent !== 0n);
  for (;;) {
    const split = splitOnce(parts);
    if (split === null) return parts.length === 0;
    parts = split;
  }
}

/** Replaces two bases with a common divisor by their coprime parts; null when all are coprime. */
function splitOnce(parts: readonly Power[]): Power[] | null {
  for (let i = 0; i < parts.length; i++) {
    for (let j = i + 1; j < parts.length; j++) {
      const a = parts[i]!;
      const b = parts[j]!;
      const common = gcd(a.base, b.base);
      if (common === 1n) continue;
      const rest = parts.filter((_, k) => k !== i && k !== j);
      const pieces = [
        { base: a.base / common, exponent: a.exponent },
        { base: b.base / common, exponent: b.exponent },
        { base: common, exponent: a.exponent + b.exponent },
      ];
      return [...rest, ...pieces.filter(({ base, exponent }) => base !== 1n && exponent !== 0n)];
    }
  }
  return null;
}

/** Bits up to which a product is written out. */
const LONGEST = 2_000;

/** ∏ value^exponent as an exact number in text, or null where it would be longer than anyone reads. */
export function productText(
  factors: readonly { readonly value: Rational; readonly exponent: number }[],
): string | null {
  let bits = 0;
  for (const { value, exponent } of factors) {
    bits += Math.abs(exponent) * (bitLength(value.numerator) + bitLength(value.denominator));
    if (bits > LONGEST) return null;
  }
  return formatRational(
    factors.reduce((product, { value, exponent }) => multiply(product, power(value, exponent)), ONE),
  );
}

function bitLength(value: bigint): number {
  return absolute(value).toString(2).length;
}

/** Numerator and denominator of a rational power as powers of integers. */
export function powersOf(value: Rational, exponent: bigint): Power[] {
  const { numerator, denominator } = rational(value.numerator, value.denominator);
  return [
    { base: numerator, exponent },
    { base: denominator, exponent: -exponent },
  ];
}
