/** Absolute value of an integer. */
export function absolute(a: bigint): bigint {
  return a < 0n ? -a : a;
}

/** Greatest common divisor, never negative; gcd(0, 0) = 0. */
export function gcd(a: bigint, b: bigint): bigint {
  let x = absolute(a);
  let y = absolute(b);
  while (y !== 0n) {
    [x, y] = [y, x % y];
  }
  return x;
}

/** Least common multiple, never negative; lcm(a, 0) = 0. */
export function lcm(a: bigint, b: bigint): bigint {
  return a === 0n || b === 0n ? 0n : absolute(a / gcd(a, b)) * absolute(b);
}

/** Greatest common divisor of all entries; 0 for a zero or empty vector. */
export function content(vector: readonly bigint[]): bigint {
  let common = 0n;
  for (const entry of vector) {
    if (entry === 0n) continue;
    common = gcd(common, entry);
    if (common === 1n) break;
  }
  return common;
}

/** The vector divided by the greatest common divisor of its entries; direction and sign stay. */
export function primitive(vector: readonly bigint[]): bigint[] {
  const common = content(vector);
  return common <= 1n ? [...vector] : vector.map((entry) => entry / common);
}

/** The primitive vector on the same line whose first non-zero entry is positive. */
export function primitiveWithPositiveLead(vector: readonly bigint[]): bigint[] {
  const reduced = primitive(vector);
  const lead = reduced.find((entry) => entry !== 0n);
  return lead !== undefined && lead < 0n ? reduced.map((entry) => -entry) : reduced;
}

/** Quotient rounded towards minus infinity, for a positive or negative divisor. */
export function floorDivide(a: bigint, b: bigint): bigint {
  const quotient = a / b;
  return a % b !== 0n && a < 0n !== b < 0n ? quotient - 1n : quotient;
}

/**
 * An integer as results carry it: a plain number up to 2^53 − 1 in absolute value, a decimal string beyond
 * (the results contract).
 */
export function integerForResult(a: bigint): number | string {
  const value = Number(a);
  return Number.isSafeInteger(value) ? value : a.toString();
}
