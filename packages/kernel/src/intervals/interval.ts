import type { Rational } from '../exact/index.ts';
import { toDouble } from '../exact/index.ts';

/** All numbers from `low` to `high`, ends included. */
export interface Interval {
  readonly low: number;
  readonly high: number;
}

/** Half a unit in the last place, relative, doubled for safety; and the smallest positive double. */
const RELATIVE = 2 ** -52;
const SMALLEST = Number.MIN_VALUE;

/**
 * An interval that surely contains what the exact operation gives: the host rounds to nearest, so each end is moved
 * outward by one unit in the last place and the smallest positive number (Moore 1966 asks for directed rounding).
 */
function widened(low: number, high: number): Interval {
  return {
    low: low - Math.abs(low) * RELATIVE - SMALLEST,
    high: high + Math.abs(high) * RELATIVE + SMALLEST,
  };
}

export const NAUGHT: Interval = { low: 0, high: 0 };

/** The interval that holds one double exactly. */
export function point(value: number): Interval {
  return { low: value, high: value };
}

/** A narrow interval around a rational number; numerator and denominator are each rounded once. */
export function enclose(value: Rational): Interval {
  const near = toDouble(value);
  const margin = Math.abs(near) * 4 * RELATIVE + SMALLEST;
  return { low: near - margin, high: near + margin };
}

/** a + b. */
export function add(a: Interval, b: Interval): Interval {
  if (a === NAUGHT) return b;
  if (b === NAUGHT) return a;
  return widened(a.low + b.low, a.high + b.high);
}

/** a − b. */
export function subtract(a: Interval, b: Interval): Interval {
  return widened(a.low - b.high, a.high - b.low);
}

/** a · b. */
export function multiply(a: Interval, b: Interval): Interval {
  if (a === NAUGHT || b === NAUGHT) return NAUGHT;
  const p = a.low * b.low;
  const q = a.low * b.high;
  const r = a.high * b.low;
  const s = a.high * b.high;
  return widened(Math.min(p, q, r, s), Math.max(p, q, r, s));
}

/** a times a double. */
export function scale(a: Interval, factor: number): Interval {
  if (factor === 0) return NAUGHT;
  const p = a.low * factor;
  const q = a.high * factor;
  return p <= q ? widened(p, q) : widened(q, p);
}

/** a^exponent for a whole exponent ≥ 0; a must not be negative. */
export function power(a: Interval, exponent: number): Interval {
  if (exponent === 0) return point(1);
  let result = a;
  for (let k = 1; k < exponent; k++) result = multiply(result, a);
  return result;
}

/** Whether a lies in the interior of b. */
export function insideOf(a: Interval, b: Interval): boolean {
  return a.low > b.low && a.high < b.high;
}

/** Whether two intervals have no common point. */
export function disjoint(a: Interval, b: Interval): boolean {
  return a.high < b.low || b.high < a.low;
}

/** −1 or 1 where the sign is certain, otherwise 0. */
export function certainSign(a: Interval): -1 | 0 | 1 {
  return a.low > 0 ? 1 : a.high < 0 ? -1 : 0;
}
