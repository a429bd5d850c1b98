import type { Verdict } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import { structuralNetwork } from '../network/index.ts';
import type { Structure } from '../structure/index.ts';
import { analyse } from '../structure/index.ts';
import { TheoremContext } from './context.ts';
import { theoremOf, theorems } from './registry.ts';
import { verdictOf } from './theorem.ts';

/** A context in which theorems can ask for each other's verdicts. */
export function contextOf(network: Network, structure?: Structure): TheoremContext {
  return new TheoremContext(
    network,
    (id, context) => verdictOf(theoremOf(id), context),
    structure ?? analyse(structuralNetwork(network)),
  );
}

/**
 * The verdict of every theorem on a network, in the order of the registry. Deterministic; work is bounded by counted
 * operations, and what does not fit is "undecided" with the reason. `structure` is handed in where it is at hand.
 */
export function judgeAll(network: Network, structure?: Structure): Verdict[] {
  const context = contextOf(network, structure);
  return theorems.map(({ id }) => context.verdict(id));
}
