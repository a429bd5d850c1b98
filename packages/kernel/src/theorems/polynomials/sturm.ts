import type { Rational } from '../../exact/index.ts';
import { isZero, negate, ONE, rational, sign } from '../../exact/index.ts';
import type { Polynomial } from './polynomial.ts';
import {
  degree,
  derivative,
  divideWithRest,
  polynomial,
  scale,
  signAtInfinity,
  valueAt,
} from './polynomial.ts';

/** An end of an open interval; null is infinity. */
export type End = Rational | null;

/**
 * The number of different real zeros of a polynomial in the open interval (low, high), exactly, by Sturm's theorem
 * (Sturm 1829). The zero polynomial has infinitely many: null.
 */
export function zerosBetween(p: Polynomial, low: End, high: End): number | null {
  if (p.length === 0) return null;
  let reduced = p;
  for (const end of [low, high]) if (end !== null) reduced = withoutZeroAt(reduced, end);
  const chain = sturmChain(reduced);
  return changes(chain, low, -1) - changes(chain, high, 1);
}

function withoutZeroAt(p: Polynomial, x: Rational): Polynomial {
  let reduced = p;
  while (degree(reduced) > 0 && isZero(valueAt(reduced, x))) {
    reduced = divideWithRest(reduced, polynomial(negate(x), ONE)).quotient;
  }
  return reduced;
}

/** p, p', and the negated remainders of Euclid's algorithm. */
function sturmChain(p: Polynomial): Polynomial[] {
  const chain = [p, derivative(p)];
  for (;;) {
    const last = chain.at(-1)!;
    if (last.length === 0) return chain.slice(0, -1);
    chain.push(scale(divideWithRest(chain.at(-2)!, last).rest, rational(-1n)));
  }
}

function changes(chain: readonly Polynomial[], end: End, direction: 1 | -1): number {
  const signs = chain
    .map((p) => (end === null ? signAtInfinity(p, direction) : sign(valueAt(p, end))))
    .filter((value) => value !== 0);
  return signs.filter((value, k) => k > 0 && value !== signs[k - 1]).length;
}
