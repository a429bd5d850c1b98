import { isNegative, scaled } from './bits.ts';
import { exactProduct, quickSum } from './double-double.ts';
import { exponentialParts } from './exponential.ts';
import { logarithm } from './logarithm.ts';

/** x^y with the special cases of IEEE 754 `pow`, but 1 to an infinite power and -1 to one are NaN, as in JavaScript. */
export function pow(x: number, y: number): number {
  if (y === 0) return 1;
  if (Number.isNaN(x) || Number.isNaN(y)) return NaN;
  if (y === 1) return x;
  if (y === 2) return x * x;
  if (y === -1) return 1 / x;
  if (!Number.isFinite(y)) return powerToInfinity(Math.abs(x), y);
  const isInteger = Math.floor(y) === y;
  const isOdd = isInteger && Math.abs(y) < 2 ** 53 && Math.floor(y / 2) * 2 !== y;
  const sign = isOdd && isNegative(x) ? -1 : 1;
  if (x === 0) return y < 0 ? sign * Infinity : sign * 0;
  if (!Number.isFinite(x)) return y < 0 ? sign * 0 : sign * Infinity;
  if (x < 0 && !isInteger) return NaN;
  return sign * positivePower(Math.abs(x), y);
}

function powerToInfinity(size: number, y: number): number {
  if (size === 1) return NaN;
  return size > 1 === y > 0 ? Infinity : 0;
}

/** exp(y ln x), the exponent in double-double. */
function positivePower(x: number, y: number): number {
  if (x === 1) return 1;
  const log = logarithm(x);
  const estimate = log.high * y;
  if (estimate > 710) return Infinity;
  if (estimate < -746) return 0;
  // Splitting a huge y would overflow; then ln x is tiny and the plain product of its size does.
  const main = Math.abs(y) < 1e290 ? exactProduct(log.high, y) : { high: estimate, low: 0 };
  const { high, low } = quickSum(main.high, main.low + log.low * y);
  const parts = exponentialParts(high, low);
  return scaled(parts.high, parts.low, parts.exponent);
}

/** x^n / (K^n + x^n); for positive x and K written so that nothing overflows. */
export function hill(x: number, k: number, n: number): number {
  if (x > 0 && k > 0) return 1 / (1 + pow(k / x, n));
  const raised = pow(x, n);
  return raised / (pow(k, n) + raised);
}
