import type { Rational } from './network.ts';

/** Integers up to here are exact in a double. */
const EXACT_LIMIT = BigInt(Number.MAX_SAFE_INTEGER);

export const zero: Rational = { numerator: 0n, denominator: 1n };
export const one: Rational = { numerator: 1n, denominator: 1n };

/** The quotient in lowest terms with a positive denominator. Throws RangeError where `denominator` is 0. */
export function quotient(numerator: bigint, denominator: bigint): Rational {
  if (denominator === 0n) throw new RangeError('A rational number cannot have the denominator 0.');
  if (denominator === 1n) return { numerator, denominator };
  const sign = denominator < 0n ? -1n : 1n;
  const divisor = gcd(numerator < 0n ? -numerator : numerator, denominator * sign) * sign;
  return { numerator: numerator / divisor, denominator: denominator / divisor };
}

/** The rational with the value of an integer. */
export function ofInteger(value: bigint | number): Rational {
  return { numerator: BigInt(value), denominator: 1n };
}

/** Greatest common divisor of two non-negative integers; gcd(0, b) = b. */
export function gcd(a: bigint, b: bigint): bigint {
  if (a <= EXACT_LIMIT && b <= EXACT_LIMIT) return BigInt(gcdOfNumbers(Number(a), Number(b)));
  while (b !== 0n) [a, b] = [b, a % b];
  return a;
}

/** Greatest common divisor of two non-negative integers below 2^53. */
export function gcdOfNumbers(a: number, b: number): number {
  while (b !== 0) {
    const rest = a % b;
    a = b;
    b = rest;
  }
  return a;
}

export function add(a: Rational, b: Rational): Rational {
  return quotient(a.numerator * b.denominator + b.numerator * a.denominator, a.denominator * b.denominator);
}

export function negate(a: Rational): Rational {
  return { numerator: -a.numerator, denominator: a.denominator };
}

export function subtract(a: Rational, b: Rational): Rational {
  return add(a, negate(b));
}

export function multiply(a: Rational, b: Rational): Rational {
  return quotient(a.numerator * b.numerator, a.denominator * b.denominator);
}

/** a / b. Throws RangeError where b is 0. */
export function divide(a: Rational, b: Rational): Rational {
  return quotient(a.numerator * b.denominator, a.denominator * b.numerator);
}

/** a^exponent for an integer exponent. Throws RangeError for 0 to a negative power. */
export function power(a: Rational, exponent: number): Rational {
  const size = BigInt(Math.abs(exponent));
  const raised = { numerator: a.numerator ** size, denominator: a.denominator ** size };
  return exponent < 0 ? quotient(raised.denominator, raised.numerator) : raised;
}

export function isInteger(a: Rational): boolean {
  return a.denominator === 1n;
}

export function equal(a: Rational, b: Rational): boolean {
  return a.numerator === b.numerator && a.denominator === b.denominator;
}

/** Negative, zero or positive as a is less than, equal to or greater than b. */
export function compare(a: Rational, b: Rational): number {
  const difference = a.numerator * b.denominator - b.numerator * a.denominator;
  return difference < 0n ? -1 : difference > 0n ? 1 : 0;
}

/** "3", "3/2", "-1/7". */
export function print(a: Rational): string {
  return a.denominator === 1n ? String(a.numerator) : `${a.numerator}/${a.denominator}`;
}

const DECIMAL = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,6}))?$/;
/** A decimal whose exponent is beyond this is no finite double, or 0, by far. */
const EXPONENT_LIMIT = 2000;

/** The exact value of a decimal such as "0.25" or "1.5e-3"; null where the text is none or its exponent is beyond ±2000. */
export function ofDecimal(text: string): Rational | null {
  return ofShortDecimal(text) ?? ofAnyDecimal(text);
}

/** Digits with at most one point, few enough that numerator and denominator are exact as doubles; null for any other text. */
function ofShortDecimal(text: string): Rational | null {
  if (text.length > 15) return null;
  let numerator = 0;
  let denominator = 0;
  for (let i = 0; i < text.length; i += 1) {
    const code = text.charCodeAt(i);
    if (code >= 48 && code <= 57) {
      numerator = numerator * 10 + code - 48;
      denominator *= 10;
    } else if (code === 46 && denominator === 0) denominator = 1;
    else return null;
  }
  if (text.length === 0 || (denominator === 1 && text.length === 1)) return null;
  if (denominator <= 1) return { numerator: BigInt(numerator), denominator: 1n };
  const divisor = gcdOfNumbers(numerator, denominator);
  return { numerator: BigInt(numerator / divisor), denominator: BigInt(denominator / divisor) };
}

function ofAnyDecimal(text: string): Rational | null {
  const parts = DECIMAL.exec(text);
  if (!parts) return null;
  const [, sign, whole = '', fraction = '', exponentText = '0'] = parts;
  if (whole === '' && fraction === '') return null;
  const exponent = Number(exponentText) - fraction.length;
  if (Math.abs(exponent) > EXPONENT_LIMIT) return null;
  const digits = BigInt(whole + fraction) * (sign === '-' ? -1n : 1n);
  if (exponent === 0) return { numerator: digits, denominator: 1n };
  const shift = 10n ** BigInt(Math.abs(exponent));
  return exponent > 0 ? { numerator: digits * shift, denominator: 1n } : quotient(digits, shift);
}

/** The exact value of a finite double. Throws RangeError for NaN and infinities. */
export function ofNumber(value: number): Rational {
  if (Number.isInteger(value)) return ofInteger(value);
  if (!Number.isFinite(value)) throw new RangeError(`${value} has no exact rational value.`);
  let scaled = value;
  let doublings = 0;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    doublings += 1;
  }
  return quotient(BigInt(scaled), 1n << BigInt(doublings));
}

/** The double nearest to a rational, ties to even: rounded once. Infinite where it is beyond the doubles. */
export function toNumber(a: Rational): number {
  const { numerator, denominator } = a;
  const size = numerator < 0n ? -numerator : numerator;
  if (size <= EXACT_LIMIT && denominator <= EXACT_LIMIT) return Number(numerator) / Number(denominator);
  if (denominator === 1n) return Number(numerator);
  const magnitude = roundedQuotient(size, denominator);
  return numerator < 0n ? -magnitude : magnitude;
}

const SMALLEST_EXPONENT = -1074;
const SIGNIFICANT_BITS = 53;

/** Positive numerator / denominator as a double, rounded half to even in integers before any conversion. */
function roundedQuotient(numerator: bigint, denominator: bigint): number {
  const excess = bitLength(numerator) - bitLength(denominator);
  // The quotient lies between 2^(excess - 1) and 2^(excess + 1): keep 53 bits, or those that a subnormal has.
  let exponent = Math.max(excess - SIGNIFICANT_BITS, SMALLEST_EXPONENT);
  let whole = shiftedQuotient(numerator, denominator, exponent);
  if (whole.floor >= 1n << BigInt(SIGNIFICANT_BITS)) {
    exponent += 1;
    whole = shiftedQuotient(numerator, denominator, exponent);
  }
  const twice = whole.rest * 2n;
  const up = twice > whole.divisor || (twice === whole.divisor && (whole.floor & 1n) === 1n);
  return scaleByPowerOfTwo(Number(up ? whole.floor + 1n : whole.floor), exponent);
}

/** floor(numerator / (denominator 2^exponent)) with its remainder. */
function shiftedQuotient(numerator: bigint, denominator: bigint, exponent: number) {
  const dividend = exponent < 0 ? numerator << BigInt(-exponent) : numerator;
  const divisor = exponent > 0 ? denominator << BigInt(exponent) : denominator;
  return { floor: dividend / divisor, rest: dividend % divisor, divisor };
}

function bitLength(value: bigint): number {
  const digits = value.toString(16);
  return digits.length * 4 - (Math.clz32(parseInt(digits[0] ?? '0', 16)) - 28);
}

/** value 2^exponent in steps that are exact because the result has no more bits than `value`. */
function scaleByPowerOfTwo(value: number, exponent: number): number {
  let result = value;
  for (let left = exponent; left !== 0;) {
    const step = Math.max(-1000, Math.min(1000, left));
    result *= 2 ** step;
    left -= step;
  }
  return result;
}
