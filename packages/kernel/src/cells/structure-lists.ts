import type {
  BySpecies,
  ConservationLaw,
  ExactNumber,
  LinkageClass,
  MinimalSiphon,
  StructureReaction,
} from '@stillroom/shared/cells';
import type { SparseVector } from '../exact/index.ts';
import { integerForResult } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { coefficientLabel, complexLabel } from '../network/index.ts';
import type { Siphon, Structure } from '../structure/index.ts';
import { membersOf } from '../structure/index.ts';

/** Laws and siphons with more species than this are named but not written out. */
export const LONGEST_SET = 20_000;
/** Terms shown of a law that is not written out. */
const SHOWN_TERMS = 6;

/** Label of each complex, in order. */
export function complexLabels(network: StructuralNetwork): string[] {
  return Array.from({ length: network.complexes.count }, (_, complex) =>
    complexLabel(network.species, network.complexes, complex),
  );
}

/** Complexes with their labels and exact contents. */
export function listComplexes(
  network: StructuralNetwork,
  labels: readonly string[],
): { label: string; of: BySpecies }[] {
  const { offsets, species, numerators, denominators } = network.complexes;
  return labels.map((label, complex) => {
    const of: Record<string, ExactNumber> = {};
    for (let k = offsets[complex]!; k < offsets[complex + 1]!; k++) {
      const denominator = denominators?.[k] ?? 1;
      of[network.species[species[k]!]!] =
        denominator === 1 ? numerators[k]! : coefficientLabel(numerators[k]!, denominator);
    }
    return { label, of };
  });
}

/** Every written reaction that the structural network keeps. */
export function listReactions(network: StructuralNetwork, labels: readonly string[]): StructureReaction[] {
  const { reactions, arrows, source } = network;
  return Array.from({ length: reactions.count }, (_, reaction) => {
    const from = reactions.from[reaction]!;
    const to = reactions.to[reaction]!;
    const written = reactions.source[reaction]!;
    const opposite = arrows.reverse[reactions.arrow[reaction]!]!;
    const constant = constantOf(network, reaction);
    return {
      row: source.reactions.row[written]!,
      label: `${labels[from]} -> ${labels[to]}`,
      from,
      to,
      constant: constant === null ? null : source.constants[constant]!.name,
      reverse: opposite < 0 ? null : arrows.reaction[opposite]!,
      law: constant === null ? 'other' : 'mass action',
    };
  });
}

/** Index of the constant of a kept reaction with mass action, stated or recognised; null for another law. */
export function constantOf(network: StructuralNetwork, reaction: number): number | null {
  const { source } = network;
  const written = network.reactions.source[reaction]!;
  const law = source.reactions.law[written]!;
  return law < 0 ? source.reactions.constant[written]! : source.laws[law]!.massAction;
}

/** Linkage classes with their numbers. */
export function listLinkageClasses({ linkage, classes }: Structure): LinkageClass[] {
  return classes.map((numbers, group) => ({
    complexes: Array.from(membersOf(linkage, group)),
    rank: numbers.rank,
    deficiency: numbers.deficiency,
    terminalStrongLinkageClasses: numbers.terminalStrongClasses,
    weaklyReversible: numbers.weaklyReversible,
  }));
}

/** Terminal strong linkage classes, each by its complexes. */
export function listTerminalClasses({ strong, terminal }: Structure): number[][] {
  const listed: number[][] = [];
  for (let group = 0; group < strong.count; group++) {
    if (terminal[group] === 1) listed.push(Array.from(membersOf(strong, group)));
  }
  return listed;
}

/** Laws with ids T1, T2, … */
export function listLaws(network: StructuralNetwork, laws: readonly SparseVector[]): ConservationLaw[] {
  return laws.map((law, index) => ({
    id: `T${index + 1}`,
    ...(law.indices.length > LONGEST_SET ? {} : { law: bySpecies(network, law) }),
    of: lawText(network, law),
    terms: law.indices.length,
  }));
}

/** Coefficients of a vector by species name. */
export function bySpecies(network: StructuralNetwork, vector: SparseVector): BySpecies {
  const entries: Record<string, ExactNumber> = {};
  for (let i = 0; i < vector.indices.length; i++) {
    entries[network.species[vector.indices[i]!]!] = integerForResult(vector.values[i]!);
  }
  return entries;
}

/** Minimal siphons that are not too long to be written out. */
export function listSiphons(network: StructuralNetwork, siphons: readonly Siphon[]): MinimalSiphon[] {
  return siphons
    .filter(({ species }) => species.length <= LONGEST_SET)
    .map(({ species, critical, law }) => ({
      species: Array.from(species, (i) => network.species[i]!),
      critical,
      ...(law === null ? {} : { law: bySpecies(network, law) }),
    }));
}

/** "E + 2 ES - P"; shortened with the number of species where it is too long to be written out. */
function lawText(network: StructuralNetwork, { indices, values }: SparseVector): string {
  const long = indices.length > LONGEST_SET;
  const shown = long ? SHOWN_TERMS : indices.length;
  let text = '';
  for (let i = 0; i < shown; i++) {
    const value = values[i]!;
    const size = value < 0n ? -value : value;
    const sign = i === 0 ? (value < 0n ? '-' : '') : value < 0n ? ' - ' : ' + ';
    text += `${sign}${size === 1n ? '' : `${size} `}${network.species[indices[i]!]!}`;
  }
  return long ? `${text} + … (${indices.length} species)` : text;
}
