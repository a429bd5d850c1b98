import { elementary } from '@stillroom/shared/expression';
import type { Rational } from '../exact/index.ts';
import { absolute, toDouble } from '../exact/index.ts';

/** Bits kept of a long integer before its logarithm is taken. */
const KEPT_BITS = 60;

/** ln of a positive integer of any length. */
export function lnOfInteger(value: bigint): number {
  const spare = Math.max(0, absolute(value).toString(2).length - KEPT_BITS);
  return elementary.ln(Number(value >> BigInt(spare))) + spare * elementary.ln(2);
}

/** ln of a positive rational. */
export function lnOfRational(value: Rational): number {
  const near = toDouble(value);
  return near > 1e-300 && Number.isFinite(near)
    ? elementary.ln(near)
    : lnOfInteger(value.numerator) - lnOfInteger(value.denominator);
}
