import type { Network } from '@stillroom/shared/network';
import type { SparseVector } from '@stillroom/kernel/exact';
import { complexLabel, structuralNetwork } from '@stillroom/kernel/network';
import type { Structure } from '@stillroom/kernel/structure';
import { analyse, membersOf } from '@stillroom/kernel/structure';

/** A structure in words that do not depend on the order of species, complexes or rows. */
export interface StructureWords {
  readonly complexes: readonly string[];
  readonly arrows: readonly string[];
  readonly linkageClasses: readonly string[];
  readonly strongClasses: readonly string[];
  readonly terminalClasses: readonly string[];
  readonly rank: number | null;
  readonly deficiency: number | null;
  readonly classRanks: readonly (number | null)[];
  readonly reversible: boolean;
  readonly weaklyReversible: boolean;
  readonly extremeLaws: readonly string[];
  readonly conservative: boolean | null;
  readonly consistent: boolean | null;
  readonly minimalSiphons: readonly string[];
  readonly criticalSiphons: readonly string[];
}

/** Analyses a network and says what was found in order-free words; `rename` maps species names. */
export function structureWords(
  network: Network,
  rename: (name: string) => string = (name) => name,
): StructureWords {
  const structure = analyse(structuralNetwork(network));
  const { species, complexes, arrows } = structure.network;
  const names = species.map(rename);
  const labels = Array.from({ length: complexes.count }, (_, y) =>
    complexLabel(names, complexes, y).split(' + ').sort().join(' + '),
  );
  const groups = (partition: Structure['linkage'], keep: (group: number) => boolean = () => true) =>
    Array.from({ length: partition.count }, (_, group) => group)
      .filter(keep)
      .map((group) =>
        Array.from(membersOf(partition, group), (y) => labels[y]!)
          .sort()
          .join('; '),
      )
      .sort();
  const law = ({ indices, values }: SparseVector) =>
    Array.from(indices, (i, k) => `${names[i]!}:${values[k]!}`)
      .sort()
      .join(',');
  const sets = (siphons: Structure['siphons']['siphons']) =>
    siphons
      .map((siphon) =>
        Array.from(siphon.species, (i) => names[i]!)
          .sort()
          .join(','),
      )
      .sort();
  return {
    complexes: [...labels].sort(),
    arrows: Array.from(
      { length: arrows.count },
      (_, arrow) => `${labels[arrows.from[arrow]!]} -> ${labels[arrows.to[arrow]!]}`,
    ).sort(),
    linkageClasses: groups(structure.linkage),
    strongClasses: groups(structure.strong),
    terminalClasses: groups(structure.strong, (group) => structure.terminal[group] === 1),
    rank: structure.rank,
    deficiency: structure.deficiency,
    classRanks: structure.classes.map(({ rank }) => rank).sort((a, b) => (a ?? -1) - (b ?? -1)),
    reversible: structure.reversible,
    weaklyReversible: structure.weaklyReversible,
    extremeLaws: structure.laws!.nonnegative.map(law).sort(),
    conservative: structure.conservative.holds,
    consistent: structure.consistent,
    minimalSiphons: sets(structure.siphons.siphons),
    criticalSiphons: sets(structure.siphons.siphons.filter(({ critical }) => critical === true)),
  };
}
