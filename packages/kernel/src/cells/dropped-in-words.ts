import type { Network } from '@stillroom/shared/network';
import { complexLabel } from '../network/index.ts';
import { list } from '../rates/index.ts';

/** Which reactions a computation leaves out because their constant is 0, for its reader. */
export function droppedInWords(network: Network, dropped: readonly number[]): string {
  const { species, complexes, reactions, laws, constants } = network;
  const label = (complex: number): string => complexLabel(species, complexes, complex);
  const words = dropped.map((reaction) => {
    const law = reactions.law[reaction]!;
    const constant = law < 0 ? reactions.constant[reaction]! : laws[law]!.massAction!;
    const arrow = `${label(reactions.from[reaction]!)} -> ${label(reactions.to[reaction]!)}`;
    return `${arrow} (${constants[constant]!.name} = 0)`;
  });
  return words.length === 1
    ? `Left out, because its constant is 0: ${words[0]}.`
    : `Left out, because their constants are 0: ${list(words)}.`;
}
