import { printExpression } from '@stillroom/shared/expression';
import type { Network } from '@stillroom/shared/network';
import type { NetworkReaction, NetworkResult } from '../results/shapes.ts';

/** The species of a complex with how often each stands in it. */
function sidesOf({ complexes, species }: Network, complex: number): NetworkReaction['from'] {
  const { offsets, numerators, denominators } = complexes;
  const sides: Record<string, number> = {};
  for (let i = offsets[complex] ?? 0; i < (offsets[complex + 1] ?? 0); i++) {
    sides[species[complexes.species[i] ?? -1] ?? ''] = (numerators[i] ?? 1) / (denominators?.[i] ?? 1);
  }
  return sides;
}

/**
 * What the scheme of a fair copy shows, from the text alone: an example of the help has no engine behind it. Equations
 * are left out.
 */
export function schemeOf(network: Network): NetworkResult {
  const { species, reactions, constants, laws, rows, units } = network;
  return {
    species,
    constants: constants.map(({ name, quantity, unit }) => ({ name, value: quantity?.value ?? null, unit })),
    start: {},
    reactions: Array.from({ length: reactions.count }, (_, i) => {
      const law = laws[reactions.law[i] ?? -1];
      const row = reactions.row[i] ?? 0;
      return {
        label: '',
        row,
        from: sidesOf(network, reactions.from[i] ?? -1),
        to: sidesOf(network, reactions.to[i] ?? -1),
        rate:
          law === undefined
            ? (constants[reactions.constant[i] ?? -1]?.name ?? '')
            : printExpression(law.expression),
        note: rows[row]?.note ?? '',
      };
    }),
    equations: [],
    canonical: '',
    counts: { species: species.length, reactions: reactions.count, constants: constants.length },
    units,
  };
}
