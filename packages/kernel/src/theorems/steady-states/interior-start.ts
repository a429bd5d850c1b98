import type { TheoremContext } from '../context.ts';

/**
 * A positive state of the class of a start, whose species may be at zero: reactions are followed a little, again and
 * again, until every species is present. Null where some species stays at zero.
 */
export function interiorStart(context: TheoremContext, start: readonly number[]): number[] | null {
  let x = [...start];
  for (let round = 0; round < context.species.length && x.some((value) => value <= 0); round++) {
    for (const { from, to } of context.arrows) {
      const change = context.coefficients.change(from, to);
      const reactants = context.terms(from).map(({ species }) => x[species]!);
      let reach = Math.min(1, ...reactants);
      for (const [i, amount] of change) if (amount < 0n) reach = Math.min(reach, x[i]! / -Number(amount));
      if (reach > 0) x = x.map((value, i) => value + 0.2 * reach * Number(change.get(i) ?? 0n));
    }
  }
  return x.every((value) => value > 0) ? x : null;
}
