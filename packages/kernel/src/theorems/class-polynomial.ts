import type { Rational } from '../exact/index.ts';
import {
  compare,
  divide,
  multiply as multiplyRational,
  negate,
  ONE,
  rational,
  sign,
  ZERO,
} from '../exact/index.ts';
import type { TheoremContext } from './context.ts';
import type { Polynomial } from './polynomials/polynomial.ts';
import { add, multiply, polynomial, scale } from './polynomials/polynomial.ts';
import type { End } from './polynomials/sturm.ts';
import { zerosBetween } from './polynomials/sturm.ts';

/** Highest degree for which zeros are counted. */
const HIGHEST_DEGREE = 40;

/**
 * The number of positive steady states on the class of the start for a mass-action network of rank 1; 'all' where every
 * state is steady; null where values are missing, coefficients are fractions, or degrees are high. The class is
 * x = a + t r with r the common direction; the rate along r is a polynomial in t, whose zeros are counted exactly between
 * the values of t at which a species reaches 0.
 */
export function zerosOnClass(context: TheoremContext): number | 'all' | null {
  const constants = context.exactConstants;
  const start = context.exactStart;
  if (constants === null || start === null || !context.whole || context.kinetics.otherLaw !== null)
    return null;
  const direction = directionOf(context);
  const lead = direction.findIndex((entry) => sign(entry) !== 0);
  const coordinate = start.map((value, i) => polynomial(value, direction[i]!));
  let total: Polynomial = [];
  for (const [arrow, { from, to }] of context.arrows.entries()) {
    const along = divide(rational(context.coefficients.change(from, to).get(lead) ?? 0n), direction[lead]!);
    const rate = monomialOf(context, from, coordinate);
    if (rate === null) return null;
    total = add(total, scale(rate, multiplyRational(along, constants[arrow]!)));
  }
  const [low, high] = positiveRange(start, direction);
  if (low !== null && high !== null && compare(low, high) >= 0) return 0;
  return zerosBetween(total, low, high) ?? 'all';
}

function directionOf(context: TheoremContext): Rational[] {
  const { from, to } = context.arrows[0]!;
  const change = context.coefficients.change(from, to);
  return context.species.map((_, i) => rational(change.get(i) ?? 0n));
}

function monomialOf(
  context: TheoremContext,
  complex: number,
  coordinate: readonly Polynomial[],
): Polynomial | null {
  let product: Polynomial = polynomial(ONE);
  for (const { species, coefficient } of context.terms(complex)) {
    if (coefficient > HIGHEST_DEGREE) return null;
    for (let k = 0; k < coefficient; k++) product = multiply(product, coordinate[species]!);
  }
  return product.length > HIGHEST_DEGREE + 1 ? null : product;
}

/** The t for which every species is positive; an empty range where one that does not change is at 0. */
function positiveRange(start: readonly Rational[], direction: readonly Rational[]): [End, End] {
  let low: End = null;
  let high: End = null;
  for (const [i, amount] of start.entries()) {
    const step = direction[i]!;
    if (sign(step) === 0) {
      if (sign(amount) <= 0) return [ZERO, ZERO];
      continue;
    }
    const end = negate(divide(amount, step));
    if (sign(step) > 0) low = low === null || compare(end, low) > 0 ? end : low;
    else high = high === null || compare(end, high) < 0 ? end : high;
  }
  return [low, high];
}
