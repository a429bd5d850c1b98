const scratch = new DataView(new ArrayBuffer(8));
const BIAS = 1023;

/** A positive finite double as mantissa 2^exponent with 1 ≤ mantissa < 2. */
export function mantissaAndExponent(value: number): { mantissa: number; exponent: number } {
  // A subnormal is made normal first.
  const isSmall = value < 2.2250738585072014e-308;
  scratch.setFloat64(0, isSmall ? value * 18014398509481984 : value);
  const high = scratch.getUint32(0);
  const exponent = (high >>> 20) - BIAS;
  scratch.setUint32(0, (high & 0xfffff) | (BIAS << 20));
  return { mantissa: scratch.getFloat64(0), exponent: isSmall ? exponent - 54 : exponent };
}

/** 2^exponent for -1022 ≤ exponent ≤ 1023. */
export function powerOfTwo(exponent: number): number {
  scratch.setUint32(0, (exponent + BIAS) << 20);
  scratch.setUint32(4, 0);
  return scratch.getFloat64(0);
}

/** (high + low) 2^exponent, rounded once also where it is subnormal, to within the last bit. */
export function scaled(high: number, low: number, exponent: number): number {
  if (exponent > 1000) return (high + low) * powerOfTwo(1000) * powerOfTwo(Math.min(exponent - 1000, 1000));
  if (exponent >= -1000) return (high + low) * powerOfTwo(exponent);
  return (high + low) * powerOfTwo(-1000) * powerOfTwo(Math.max(exponent + 1000, -1000));
}

/** Whether the sign bit of a double is set: tells -0 from 0. */
export function isNegative(value: number): boolean {
  return value < 0 || (value === 0 && 1 / value < 0);
}
