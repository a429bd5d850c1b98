import type { StructureComparison, StructureCounts, Verdict } from '@stillroom/shared/cells';
import type { Figures, Structure } from '../structure/index.ts';
import { complexLabels } from './structure-lists.ts';

/** Differing arrows listed on each side. */
const LISTED_ARROWS = 200;

/** The figures of a network. */
export function countsOf(structure: Figures): StructureCounts {
  return {
    species: structure.network.species.length,
    complexes: structure.network.complexes.count,
    reactions: structure.network.arrows.count,
    linkageClasses: structure.linkage.count,
    strongLinkageClasses: structure.strong.count,
    terminalStrongLinkageClasses: structure.terminalCount,
    rank: structure.rank,
    deficiency: structure.deficiency,
  };
}

/** What another network has otherwise than the one at hand. */
export function compareStructures(
  here: Structure,
  verdictsHere: readonly Verdict[],
  name: string,
  there: Structure,
  verdictsThere: readonly Verdict[],
): StructureComparison {
  const arrowsHere = arrowLabels(here);
  const arrowsThere = arrowLabels(there);
  const other = new Map(verdictsThere.map((verdict) => [verdict.id, verdict.applies]));
  return {
    network: name,
    counts: countsOf(there),
    reversible: there.reversible,
    weaklyReversible: there.weaklyReversible,
    conservative: there.conservative.holds,
    consistent: there.consistent,
    onlyHere: missingFrom(arrowsHere, arrowsThere),
    onlyThere: missingFrom(arrowsThere, arrowsHere),
    verdicts: verdictsHere.flatMap(({ id, applies }) => {
      const its = other.get(id);
      return its === undefined || its === applies ? [] : [{ id, here: applies, there: its }];
    }),
  };
}

/** Arrows by what they say, whatever the order in which species first appeared: "A + B -> 2 B" once its terms are sorted. */
function arrowLabels(structure: Structure): Map<string, string> {
  const { network } = structure;
  const labels = complexLabels(network);
  const sorted = labels.map((label) => label.split(' + ').sort().join(' + '));
  const arrows = new Map<string, string>();
  for (let arrow = 0; arrow < network.arrows.count; arrow++) {
    const from = network.arrows.from[arrow]!;
    const to = network.arrows.to[arrow]!;
    arrows.set(`${sorted[from]} -> ${sorted[to]}`, `${labels[from]} -> ${labels[to]}`);
  }
  return arrows;
}

function missingFrom(arrows: ReadonlyMap<string, string>, other: ReadonlyMap<string, string>): string[] {
  return [...arrows]
    .filter(([key]) => !other.has(key))
    .slice(0, LISTED_ARROWS)
    .map(([, label]) => label);
}
