import type { DoubleDouble } from './double-double.ts';
import { exactSum } from './double-double.ts';
import { scaled } from './bits.ts';
import { EXP_STEP, EXP_TABLE } from './tables.ts';

/** 32 / ln 2. */
const STEPS_PER_UNIT = 46.16624130844683;
/** Beyond these the result is infinite, or less than half of the smallest double. */
const LARGEST = 709.782712893384;
const SMALLEST = -745.1332191019412;

/**
 * e^(x + low) as (high + low) 2^exponent with 1 ≤ high < 2, for |x| ≤ 746: table of 2^(j/32) and the Taylor polynomial on
 * the rest, which is below ln 2 / 64 (Tang 1989). The relative error is below 2^-59.
 */
export function exponentialParts(x: number, low = 0): DoubleDouble & { exponent: number } {
  const steps = Math.floor(x * STEPS_PER_UNIT + 0.5);
  const j = steps - 32 * Math.floor(steps / 32);
  // The first product is exact; the second and `low` come in as a correction.
  const near = x - steps * EXP_STEP.high;
  const { high: r, low: rLow } = exactSum(near, low - steps * EXP_STEP.low);
  const tableHigh = EXP_TABLE[2 * j] as number;
  const tableLow = EXP_TABLE[2 * j + 1] as number;
  const square = r * r;
  const tail = square * (0.5 + r * (1 / 6 + r * (1 / 24 + r * (1 / 120 + r * (1 / 720 + r / 5040)))));
  const growth = r + (tail + rLow * (1 + r));
  return { high: tableHigh, low: tableLow + tableHigh * growth, exponent: (steps - j) / 32 };
}

/** e^x. */
export function exp(x: number): number {
  if (Number.isNaN(x)) return NaN;
  if (x > LARGEST) return Infinity;
  if (x < SMALLEST) return 0;
  const { high, low, exponent } = exponentialParts(x);
  return scaled(high, low, exponent);
}
