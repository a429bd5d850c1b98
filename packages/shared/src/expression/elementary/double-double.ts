/**
 * A number held as the unevaluated sum of two doubles, `low` small against `high`: about 105 bits. Error-free sums and
 * products after Dekker 1971 and Knuth 1969; only operations that IEEE 754 rounds correctly are used, so that every
 * machine gives the same bits.
 */
export interface DoubleDouble {
  readonly high: number;
  readonly low: number;
}

/** Cuts a double into two halves of 26 bits (2^27 + 1). */
const SPLITTER = 134217729;

/** a + b exactly, for |a| ≥ |b| or a = 0. */
export function quickSum(a: number, b: number): DoubleDouble {
  const high = a + b;
  return { high, low: b - (high - a) };
}

/** a + b exactly. */
export function exactSum(a: number, b: number): DoubleDouble {
  const high = a + b;
  const part = high - a;
  return { high, low: a - (high - part) + (b - part) };
}

/** a b exactly, where neither overflows when split. */
export function exactProduct(a: number, b: number): DoubleDouble {
  const high = a * b;
  const aSplit = SPLITTER * a;
  const aHigh = aSplit - (aSplit - a);
  const aLow = a - aHigh;
  const bSplit = SPLITTER * b;
  const bHigh = bSplit - (bSplit - b);
  const bLow = b - bHigh;
  return { high, low: aLow * bLow - (high - aHigh * bHigh - aLow * bHigh - aHigh * bLow) };
}

export function sum(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const { high, low } = exactSum(a.high, b.high);
  return quickSum(high, low + (a.low + b.low));
}

export function difference(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  return sum(a, { high: -b.high, low: -b.low });
}

export function product(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const { high, low } = exactProduct(a.high, b.high);
  return quickSum(high, low + (a.high * b.low + a.low * b.high));
}

export function quotient(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const first = a.high / b.high;
  const back = exactProduct(first, b.high);
  const rest = a.high - back.high - back.low + a.low - first * b.low;
  return quickSum(first, rest / b.high);
}

/** The square root of a non-negative number. */
export function squareRoot(a: DoubleDouble): DoubleDouble {
  const first = Math.sqrt(a.high);
  if (first === 0) return { high: 0, low: 0 };
  const back = exactProduct(first, first);
  return quickSum(first, (a.high - back.high - back.low + a.low) / (2 * first));
}

export function of(value: number): DoubleDouble {
  return { high: value, low: 0 };
}

/** The double nearest to it. */
export function rounded(a: DoubleDouble): number {
  return a.high + a.low;
}
