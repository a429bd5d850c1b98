import type { Rational } from '../../exact/index.ts';
import {
  add as addRational,
  divide,
  isZero,
  multiply as multiplyRational,
  negate,
  rational,
  sign,
  ZERO,
} from '../../exact/index.ts';

/** A polynomial in one variable with rational coefficients, constant term first, no zero at the end; empty is 0. */
export type Polynomial = readonly Rational[];

/** Drops zeros at the end. */
function trimmed(coefficients: Rational[]): Polynomial {
  while (coefficients.length > 0 && isZero(coefficients.at(-1)!)) coefficients.pop();
  return coefficients;
}

/** The polynomial with the given coefficients, constant term first. */
export function polynomial(...coefficients: Rational[]): Polynomial {
  return trimmed([...coefficients]);
}

/** −1 for the zero polynomial. */
export function degree(p: Polynomial): number {
  return p.length - 1;
}

/** p + q. */
export function add(p: Polynomial, q: Polynomial): Polynomial {
  return trimmed(
    Array.from({ length: Math.max(p.length, q.length) }, (_, k) => addRational(p[k] ?? ZERO, q[k] ?? ZERO)),
  );
}

/** c · p. */
export function scale(p: Polynomial, c: Rational): Polynomial {
  return trimmed(p.map((coefficient) => multiplyRational(coefficient, c)));
}

/** p − q. */
export function subtract(p: Polynomial, q: Polynomial): Polynomial {
  return add(p, scale(q, rational(-1n)));
}

/** p · q. */
export function multiply(p: Polynomial, q: Polynomial): Polynomial {
  if (p.length === 0 || q.length === 0) return [];
  const product = Array.from({ length: p.length + q.length - 1 }, () => ZERO);
  p.forEach((a, i) => {
    q.forEach((b, j) => (product[i + j] = addRational(product[i + j]!, multiplyRational(a, b))));
  });
  return trimmed(product);
}

/** Quotient and remainder; the divisor must not be 0. */
export function divideWithRest(
  p: Polynomial,
  divisor: Polynomial,
): { quotient: Polynomial; rest: Polynomial } {
  const rest = [...p];
  const lead = divisor.at(-1)!;
  const quotient = Array.from({ length: Math.max(0, p.length - divisor.length + 1) }, () => ZERO);
  for (let k = quotient.length - 1; k >= 0; k--) {
    const factor = divide(rest[k + divisor.length - 1] ?? ZERO, lead);
    quotient[k] = factor;
    if (isZero(factor)) continue;
    divisor.forEach((coefficient, i) => {
      rest[k + i] = addRational(rest[k + i]!, negate(multiplyRational(factor, coefficient)));
    });
  }
  return { quotient: trimmed(quotient), rest: trimmed(rest.slice(0, Math.max(0, divisor.length - 1))) };
}

/** p'. */
export function derivative(p: Polynomial): Polynomial {
  return trimmed(p.slice(1).map((coefficient, k) => multiplyRational(coefficient, rational(BigInt(k + 1)))));
}

/** p(x). */
export function valueAt(p: Polynomial, x: Rational): Rational {
  return p.reduceRight((value, coefficient) => addRational(multiplyRational(value, x), coefficient), ZERO);
}

/** The sign of p(x) for x → ∞ or x → −∞. */
export function signAtInfinity(p: Polynomial, direction: 1 | -1): -1 | 0 | 1 {
  const lead = p.at(-1);
  if (lead === undefined) return 0;
  const flips = direction < 0 && degree(p) % 2 === 1;
  return flips ? (-sign(lead) as -1 | 1) : sign(lead);
}
