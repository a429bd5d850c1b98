import type { ListedReaction, NetworkResult } from '@stillroom/shared/cells';
import { printExpression } from '@stillroom/shared/expression';
import type { Network } from '@stillroom/shared/network';
import { complexLabel } from '../network/index.ts';
import { type Member, members } from '../rates/index.ts';
import { rateEquationsTex } from './equations-tex.ts';
import { resultUnits } from './units.ts';

/** Beyond so many reactions or species the long lists are left out. */
const longestList = 20_000;

/** The result of a network cell. `canonical` is the text's canonical print. */
export function describeNetwork(network: Network, canonical: string): NetworkResult {
  const { species, reactions, constants } = network;
  const listed = reactions.count <= longestList && species.length <= longestList;
  const start: Record<string, number> = {};
  const given = [...network.start, ...network.fixed].sort(([a], [b]) => a - b);
  for (const [index, { value }] of given) start[species[index]!] = value;
  return {
    species: listed ? species : [],
    constants: listed
      ? constants.map(({ name, quantity, unit }) => ({ name, value: quantity?.value ?? null, unit }))
      : [],
    start: listed ? start : {},
    reactions: listed ? listReactions(network) : [],
    equations: listed ? rateEquationsTex(network) : [],
    canonical,
    counts: { species: species.length, reactions: reactions.count, constants: constants.length },
    ...(listed ? {} : { listed: false as const }),
    units: resultUnits(network),
  };
}

function listReactions(network: Network): ListedReaction[] {
  const { species, complexes, reactions, rows } = network;
  const labels = Array.from({ length: complexes.count }, (_, index) =>
    complexLabel(species, complexes, index),
  );
  const contents = Array.from({ length: complexes.count }, (_, index) => members(complexes, index));
  const named = (list: readonly Member[]): Record<string, number> =>
    Object.fromEntries(list.map(({ species: index, coefficient }) => [species[index]!, coefficient]));
  return Array.from({ length: reactions.count }, (_, reaction) => {
    const from = reactions.from[reaction]!;
    const to = reactions.to[reaction]!;
    const row = reactions.row[reaction]!;
    return {
      label: `${labels[from]} -> ${labels[to]}`,
      row,
      from: named(contents[from]!),
      to: named(contents[to]!),
      rate: rateText(network, reaction, contents[from]!),
      note: rows[row]?.note ?? '',
    };
  });
}

/** The rate as an expression of the notation. */
function rateText(network: Network, reaction: number, from: readonly Member[]): string {
  const { species, reactions, laws, constants } = network;
  const law = reactions.law[reaction]!;
  if (law >= 0) return printExpression(laws[law]!.expression);
  const factors = from.map(({ species: index, coefficient }) =>
    coefficient === 1 ? species[index]! : `${species[index]!}^${coefficient}`,
  );
  return [constants[reactions.constant[reaction]!]!.name, ...factors].join('*');
}
