import type { Rational } from '../exact/index.ts';
import { divide, equals, multiply, ONE, power, rational } from '../exact/index.ts';
import type { TheoremContext } from '../theorems/context.ts';
import { treeConstants } from './tree-constants.ts';

/** Largest coefficient for which exact powers are formed. */
const HIGHEST = 100;

/**
 * A complex-balanced state with rational entries, where one is found by following arrows: (c^{y'} / c^y) = K_{y'} / K_y gives
 * one species after another where it enters with one molecule more or less; species that remain free are set to 1. Null
 * where this does not reach every species, or the constants are not complex balanced.
 */
export function exactBalancedState(context: TheoremContext): readonly Rational[] | null {
  return context.memo('exact balanced state', () => {
    const constants = context.exactConstants;
    const trees = constants && context.whole ? treeConstants(context, constants) : null;
    if (trees === null || context.highestCoefficient > HIGHEST) return null;
    const known = new Map<number, Rational>();
    while (known.size < context.species.length) {
      if (!extend(context, trees, known))
        known.set(
          context.species.findIndex((_, i) => !known.has(i)),
          ONE,
        );
    }
    const state = context.species.map((_, i) => known.get(i)!);
    const balanced = context.arrows.every(({ from, to }) =>
      equals(ratioOf(context, from, to, known), rational(trees[to]!, trees[from]!)),
    );
    return balanced ? state : null;
  });
}

/** One pass over the arrows; whether some species became known. */
function extend(context: TheoremContext, trees: readonly bigint[], known: Map<number, Rational>): boolean {
  const before = known.size;
  for (const { from, to } of context.arrows) {
    const open = [...context.coefficients.change(from, to)].filter(([i]) => !known.has(i));
    const [only] = open;
    if (open.length !== 1 || (only![1] !== 1n && only![1] !== -1n)) continue;
    const rest = divide(rational(trees[to]!, trees[from]!), ratioOf(context, from, to, known));
    known.set(only![0], only![1] === 1n ? rest : power(rest, -1));
  }
  return known.size > before;
}

/** c^{y' − y} over the species that are known. */
function ratioOf(
  context: TheoremContext,
  from: number,
  to: number,
  known: ReadonlyMap<number, Rational>,
): Rational {
  let ratio: Rational = ONE;
  for (const [i, amount] of context.coefficients.change(from, to)) {
    const value = known.get(i);
    if (value !== undefined) ratio = multiply(ratio, power(value, Number(amount)));
  }
  return ratio;
}
