import { difference, of, product, quickSum, quotient, rounded, squareRoot, sum } from './double-double.ts';
import type { DoubleDouble } from './double-double.ts';
import { ATAN_TABLE, HALF_PI, PI } from './tables.ts';

const one = of(1);

/** arctan(y / x) for y ≥ 0, x ≥ 0, not both 0: between 0 and π/2. */
function angle(y: DoubleDouble, x: DoubleDouble): DoubleDouble {
  if (y.high > x.high) return difference(HALF_PI, smallAngle(x, y));
  return smallAngle(y, x);
}

/**
 * arctan(y / x) for 0 ≤ y ≤ x: the nearest arctan(j/16) from a table and the series of what is left,
 * arctan((y - c x) / (x + c y)), which is below 1/31.
 */
function smallAngle(y: DoubleDouble, x: DoubleDouble): DoubleDouble {
  const j = Math.floor((y.high / x.high) * 16 + 0.5);
  const c = of(j / 16);
  const t = quotient(difference(y, product(c, x)), sum(x, product(c, y)));
  const z = t.high * t.high;
  const tail = z * (-1 / 3 + z * (1 / 5 + z * (-1 / 7 + z * (1 / 9 + z * (-1 / 11 + z / 13)))));
  const near = quickSum(t.high, t.low + t.high * tail);
  const entry = { high: ATAN_TABLE[2 * j] as number, low: ATAN_TABLE[2 * j + 1] as number };
  return j === 0 ? near : sum(entry, near);
}

/** sqrt(1 - x²), from (1 - x)(1 + x), of which both factors are exact as sums of two doubles. */
function cofunction(size: number): DoubleDouble {
  return squareRoot(product(difference(one, of(size)), sum(one, of(size))));
}

/** The arctangent in radians. */
export function atan(x: number): number {
  const size = Math.abs(x);
  if (!(size >= 1e-8)) return x;
  const result = size > 1e300 ? HALF_PI.high : rounded(angle(of(size), one));
  return x < 0 ? -result : result;
}

/** The arcsine in radians; NaN outside [-1, 1]. */
export function asin(x: number): number {
  const size = Math.abs(x);
  if (!(size <= 1)) return NaN;
  if (size < 1e-8) return x;
  const result = rounded(angle(of(size), cofunction(size)));
  return x < 0 ? -result : result;
}

/** The arccosine in radians; NaN outside [-1, 1]. */
export function acos(x: number): number {
  const size = Math.abs(x);
  if (!(size <= 1)) return NaN;
  const acute = angle(cofunction(size), of(size));
  return rounded(x < 0 ? difference(PI, acute) : acute);
}
