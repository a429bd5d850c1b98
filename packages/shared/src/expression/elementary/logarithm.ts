import { mantissaAndExponent } from './bits.ts';
import { exactProduct, exactSum, product, quickSum, rounded, sum } from './double-double.ts';
import type { DoubleDouble } from './double-double.ts';
import { INVERSE_LN10, LN2, LOG_TABLE } from './tables.ts';

const FIRST_ENTRY = -20;
const ROOT_TWO = 1.4142135623730951;

/**
 * ln x for a positive finite x to about 2^-66 relative: x = 2^e F (1 + f) with F = 1 + j/64 from a table and the
 * series of ln(1 + f), |f| ≤ 1/90, its first two terms in double-double (after Tang 1990).
 */
export function logarithm(x: number): DoubleDouble {
  let { mantissa, exponent } = mantissaAndExponent(x);
  if (mantissa > ROOT_TWO) {
    mantissa /= 2;
    exponent += 1;
  }
  const j = Math.floor((mantissa - 1) * 64 + 0.5);
  const center = 1 + j / 64;
  const f = quotientOf(mantissa - center, center);
  const near = logarithmNearOne(f);
  const entry = 2 * (j - FIRST_ENTRY);
  const table = { high: LOG_TABLE[entry] as number, low: LOG_TABLE[entry + 1] as number };
  const scaledLn2 = product({ high: exponent, low: 0 }, LN2);
  return sum(scaledLn2, sum(table, near));
}

/** a / b as a double-double, for exact a and b. */
function quotientOf(a: number, b: number): DoubleDouble {
  const high = a / b;
  const back = exactProduct(high, b);
  return { high, low: (a - back.high - back.low) / b };
}

/** ln(1 + f) for |f| ≤ 1/64. */
function logarithmNearOne(f: DoubleDouble): DoubleDouble {
  const x = f.high;
  const square = exactProduct(x, x);
  const minusHalf = { high: -0.5 * square.high, low: -0.5 * square.low - x * f.low };
  const series =
    1 / 3 -
    x * (1 / 4 - x * (1 / 5 - x * (1 / 6 - x * (1 / 7 - x * (1 / 8 - x * (1 / 9 - x * (1 / 10 - x / 11)))))));
  const first = exactSum(x, minusHalf.high);
  return quickSum(first.high, first.low + (f.low + minusHalf.low + x * square.high * series));
}

/** ln x: NaN below 0, -Infinity at 0. */
export function ln(x: number): number {
  if (!(x > 0)) return x === 0 ? -Infinity : NaN;
  return x === Infinity ? Infinity : rounded(logarithm(x));
}

/** The logarithm to base 10; exact at powers of ten. */
export function log10(x: number): number {
  if (!(x > 0)) return x === 0 ? -Infinity : NaN;
  return x === Infinity ? Infinity : rounded(product(logarithm(x), INVERSE_LN10));
}
