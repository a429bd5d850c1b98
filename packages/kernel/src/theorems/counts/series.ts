import type { Rational } from '../../exact/index.ts';
import { add, divide, multiply, ONE, rational, ZERO } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';

/** Taylor coefficients, constant term first. */
export type Series = Rational[];

/** The Taylor series of the solution of the mass-action rate equations from a rational state, species by species. */
export function solutionSeries(
  context: TheoremContext,
  constants: readonly Rational[],
  start: readonly Rational[],
  order: number,
): { readonly species: readonly Series[]; monomial(complex: number): Series } {
  const species: Series[] = start.map((value) => [value]);
  const changes = context.arrows.map(({ from, to }) => context.coefficients.change(from, to));
  const reactants = [...new Set(context.arrows.map(({ from }) => from))];
  for (let k = 0; k < order; k++) {
    const monomials = new Map(
      reactants.map((complex) => [complex, coefficientOf(context, species, complex, k)]),
    );
    const slopes = start.map(() => ZERO);
    context.arrows.forEach(({ from }, arrow) => {
      const rate = multiply(constants[arrow]!, monomials.get(from)!);
      if (rate.numerator === 0n) return;
      for (const [i, amount] of changes[arrow]!)
        slopes[i] = add(slopes[i]!, multiply(rate, rational(amount)));
    });
    slopes.forEach((slope, i) => species[i]!.push(divide(slope, rational(BigInt(k + 1)))));
  }
  return { species, monomial: (complex) => monomialSeries(context, species, complex, order + 1) };
}

function coefficientOf(
  context: TheoremContext,
  species: readonly Series[],
  complex: number,
  k: number,
): Rational {
  return monomialSeries(context, species, complex, k + 1)[k] ?? ZERO;
}

/** x(t)^y up to a number of coefficients. */
function monomialSeries(
  context: TheoremContext,
  species: readonly Series[],
  complex: number,
  length: number,
): Series {
  let product: Series = [ONE];
  for (const { species: i, coefficient } of context.terms(complex)) {
    for (let k = 0; k < coefficient; k++) product = cut(product, species[i]!, length);
  }
  return Array.from({ length }, (_, k) => product[k] ?? ZERO);
}

function cut(a: Series, b: Series, length: number): Series {
  return Array.from({ length }, (_, k) => {
    let sum = ZERO;
    for (let i = 0; i <= k; i++) {
      const left = a[i];
      const right = b[k - i];
      if (left === undefined || right === undefined || left.numerator === 0n || right.numerator === 0n)
        continue;
      sum = add(sum, multiply(left, right));
    }
    return sum;
  });
}
