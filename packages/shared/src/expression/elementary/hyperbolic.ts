import { powerOfTwo, scaled } from './bits.ts';
import { difference, exactProduct, product, quickSum, quotient, rounded, sum } from './double-double.ts';
import type { DoubleDouble } from './double-double.ts';
import { exponentialParts } from './exponential.ts';

/** Below this sinh is its series: the difference of two exponentials would lose digits. */
const SERIES_LIMIT = 0.35;
/** Beyond this e^-x is nothing beside e^x. */
const ONE_SIDED = 22;
const OVERFLOW = 710.4758600739439;

/** e^x and e^-x for 0 ≤ x ≤ 22. */
function bothExponentials(x: number): { up: DoubleDouble; down: DoubleDouble } {
  const parts = exponentialParts(x);
  const scale = powerOfTwo(parts.exponent);
  const up = quickSum(parts.high * scale, parts.low * scale);
  return { up, down: quotient({ high: 1, low: 0 }, up) };
}

/** sinh by its Taylor series, for |x| ≤ 0.35. */
function sinhSeries(x: number): DoubleDouble {
  const z = x * x;
  const tail =
    1 / 6 + z * (1 / 120 + z * (1 / 5040 + z * (1 / 362880 + z * (1 / 39916800 + z / 6227020800))));
  return quickSum(x, x * z * tail);
}

/** cosh by its Taylor series, for |x| ≤ 0.35. */
function coshSeries(x: number): DoubleDouble {
  const square = exactProduct(x, x);
  const z = square.high;
  const tail = 1 / 24 + z * (1 / 720 + z * (1 / 40320 + z * (1 / 3628800 + z / 479001600)));
  return sum({ high: 1, low: 0 }, { high: z / 2, low: square.low / 2 + z * z * tail });
}

/** e^x / 2 where it may be beyond the doubles by less than that half. */
function halfExponential(x: number): number {
  if (x > OVERFLOW) return Infinity;
  const { high, low, exponent } = exponentialParts(x);
  return scaled(high, low, exponent - 1);
}

export function sinh(x: number): number {
  const size = Math.abs(x);
  if (Number.isNaN(x) || size < 1e-8) return x;
  if (size <= SERIES_LIMIT) return rounded(sinhSeries(x));
  const result = size > ONE_SIDED ? halfExponential(size) : rounded(halfOf(difference, size));
  return x < 0 ? -result : result;
}

export function cosh(x: number): number {
  const size = Math.abs(x);
  if (Number.isNaN(x)) return NaN;
  return size > ONE_SIDED ? halfExponential(size) : rounded(halfOf(sum, size));
}

export function tanh(x: number): number {
  const size = Math.abs(x);
  if (Number.isNaN(x) || size < 1e-8) return x;
  if (size <= SERIES_LIMIT) return rounded(quotient(sinhSeries(x), coshSeries(x)));
  if (size > ONE_SIDED) return x < 0 ? -1 : 1;
  const { up, down } = bothExponentials(size);
  const result = rounded(quotient(difference(up, down), sum(up, down)));
  return x < 0 ? -result : result;
}

function halfOf(combine: (a: DoubleDouble, b: DoubleDouble) => DoubleDouble, x: number): DoubleDouble {
  const { up, down } = bothExponentials(x);
  return product(combine(up, down), { high: 0.5, low: 0 });
}
