/** Primes lie below 2^22, so that 512 products of two residues add up below 2^53 without rounding. */
const LARGEST = 4194301;
/** How many products of residues may be added to a residue before the sum must be reduced. */
export const PRODUCTS_BEFORE_REDUCTION = 500;

/** The prime field Z/p; residues are integers in 0 … p − 1. */
export interface PrimeField {
  readonly p: number;
  /** 1 / p, for division by multiplication. */
  readonly reciprocal: number;
}

/** The k-th largest prime below 2^22 as a field, k = 0, 1, … */
export function primeField(k: number): PrimeField {
  let p = LARGEST;
  for (let passed = 0; passed < k;) {
    p -= 2;
    if (isPrime(p)) passed++;
  }
  return { p, reciprocal: 1 / p };
}

function isPrime(odd: number): boolean {
  for (let divisor = 3; divisor * divisor <= odd; divisor += 2) {
    if (odd % divisor === 0) return false;
  }
  return true;
}

/** The residue of a non-negative integer below 2^53. */
export function reduce(value: number, p: number, reciprocal: number): number {
  const rest = value - Math.floor(value * reciprocal) * p;
  return rest < 0 ? rest + p : rest >= p ? rest - p : rest;
}

/** a · b of two residues. */
export function multiplyResidues(a: number, b: number, p: number, reciprocal: number): number {
  return reduce(a * b, p, reciprocal);
}

/** The residue of a safe integer of either sign. */
export function residueOf(value: number, p: number): number {
  const rest = value % p;
  return rest < 0 ? rest + p : rest;
}

/** 1 / a for a residue that is not 0 (extended Euclid). */
export function inverseResidue(a: number, p: number): number {
  let [r0, r1, t0, t1] = [p, a, 0, 1];
  while (r1 !== 0) {
    const quotient = Math.floor(r0 / r1);
    [r0, r1] = [r1, r0 - quotient * r1];
    [t0, t1] = [t1, t0 - quotient * t1];
  }
  return t0 < 0 ? t0 + p : t0;
}
