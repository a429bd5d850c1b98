import type { StructureComparison, StructureResult, Verdict } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import type { StructuralNetwork } from '../network/index.ts';
import { structuralNetwork, structuralNetworkAsWritten } from '../network/index.ts';
import type { Checkpoint, Structure } from '../structure/index.ts';
import { analyse, figures, nonterminalComplexes } from '../structure/index.ts';
import { judgeAll } from '../theorems/index.ts';
import { rateEquationsTex } from './equations-tex.ts';
import { compareStructures, countsOf } from './structure-comparison.ts';
import {
  LONGEST_SET,
  bySpecies,
  complexLabels,
  listComplexes,
  listLaws,
  listLinkageClasses,
  listReactions,
  listSiphons,
  listTerminalClasses,
} from './structure-lists.ts';
import { structureMatrices } from './structure-matrices.ts';
import { structureNotes } from './structure-notes.ts';
import { resultUnits } from './units.ts';

/** Above so many complexes, or written reactions, the long lists are left out. */
const LONGEST_LIST = 20_000;
/** Networks with more species than this have no typeset rate equations in their structure. */
const TYPESET_SPECIES = 200;

/** What an analysis is given besides its network; nothing in it but `compare` changes the result. */
export interface StructureOptions {
  /** Networks to set beside it, under the names of their cells. */
  readonly compare?: readonly { readonly name: string; readonly network: Network }[];
  /** Told what is being done and how far it is; may throw to end the analysis. */
  readonly checkpoint?: Checkpoint;
  /** Judges the theorems; all of the registry by default. */
  readonly judge?: (network: Network, structure: Structure) => readonly Verdict[];
}

/** The result of a structure cell: every structural quantity of the network, exact, and every verdict. */
export function analyseStructure(network: Network, options: StructureOptions = {}): StructureResult {
  const { compare = [], checkpoint = () => undefined, judge = judgeAll } = options;
  const share = 1 / (compare.length + 1);
  const part = (index: number): Checkpoint => {
    return (progress, words) =>
      checkpoint(progress === undefined ? undefined : (index + progress) * share, words);
  };
  const own = study(network, part(0), judge);
  const comparisons = compare.map((other, index) => {
    const theirs = study(other.network, part(index + 1), judge);
    return compareStructures(own.structure, own.verdicts, other.name, theirs.structure, theirs.verdicts);
  });
  return describe(network, own.structure, own.verdicts, comparisons);
}

function study(
  network: Network,
  checkpoint: Checkpoint,
  judge: NonNullable<StructureOptions['judge']>,
): { structure: Structure; verdicts: readonly Verdict[] } {
  const structure = analyse(structuralNetwork(network), checkpoint);
  checkpoint(0.95, 'verdicts');
  return { structure, verdicts: judge(network, structure) };
}

function describe(
  network: Network,
  structure: Structure,
  verdicts: readonly Verdict[],
  comparisons: readonly StructureComparison[],
): StructureResult {
  const structural = structure.network;
  const { laws, siphons } = structure;
  const listed =
    structural.complexes.count <= LONGEST_LIST &&
    structural.reactions.count <= LONGEST_LIST &&
    structural.species.length <= LONGEST_LIST;
  const nonnegative = (laws?.nonnegative ?? []).filter(({ indices }) => indices.length <= LONGEST_SET);
  return {
    ...(listed ? lists(structure) : { listed: false as const }),
    counts: countsOf(structure),
    ...(structural.reduced ? { asWritten: countsOf(figures(structuralNetworkAsWritten(network))) } : {}),
    reduced: structural.reduced,
    reversible: structure.reversible,
    weaklyReversible: structure.weaklyReversible,
    conservationLaws: listLaws(structural, laws?.basis ?? []),
    nonnegativeConservationLaws: nonnegative.map((law) => bySpecies(structural, law)),
    ...positiveLaw(structure),
    conservative: structure.conservative.holds,
    consistent: structure.consistent,
    siphons: listSiphons(structural, siphons.siphons),
    robustSpecies: robustSpecies(structural, verdicts),
    verdicts,
    complete: {
      conservationLaws: laws?.complete ?? false,
      nonnegativeConservationLaws:
        (laws?.nonnegativeComplete ?? false) && nonnegative.length === laws?.nonnegative.length,
      siphons: siphons.complete && siphons.siphons.every(({ species }) => species.length <= LONGEST_SET),
    },
    notes: structureNotes(structure),
    ...(listed && network.species.length <= TYPESET_SPECIES ? { equations: rateEquationsTex(network) } : {}),
    ...(comparisons.length > 0 ? { comparisons } : {}),
    units: resultUnits(network),
  };
}

/** Stands for the extreme laws where there are too many to list. */
function positiveLaw({ network, laws, conservative }: Structure): Pick<StructureResult, 'positiveLaw'> {
  if (!conservative.holds || laws === null || laws.nonnegativeComplete) return {};
  const { law } = conservative;
  return law.indices.length > LONGEST_SET ? {} : { positiveLaw: bySpecies(network, law) };
}

function lists(structure: Structure): Partial<StructureResult> {
  const { network } = structure;
  const labels = complexLabels(network);
  const matrices = structureMatrices(network, labels);
  return {
    species: network.species,
    complexes: listComplexes(network, labels),
    reactions: listReactions(network, labels),
    linkageClasses: listLinkageClasses(structure),
    terminalStrongClasses: listTerminalClasses(structure),
    nonterminalComplexes: Array.from(nonterminalComplexes(structure.strong, structure.terminal)),
    ...(matrices === null ? {} : { matrices }),
  };
}

/** The species that the pairs of complexes of the verdict on robustness differ in, where it applies. */
function robustSpecies(network: StructuralNetwork, verdicts: readonly Verdict[]): string[] {
  const verdict = verdicts.find(({ id, applies }) => id === 'robust-species' && applies === 'yes');
  const robust = new Set<number>();
  for (const { witness } of verdict?.hypotheses ?? []) {
    if (witness?.kind !== 'set' || !('complexes' in witness)) continue;
    const [a, b] = witness.complexes.map((complex) => contents(network, complex));
    if (a === undefined || b === undefined) continue;
    for (const species of [...a.keys(), ...b.keys()])
      if (a.get(species) !== b.get(species)) robust.add(species);
  }
  return [...robust].sort((a, b) => a - b).map((species) => network.species[species]!);
}

function contents({ complexes }: StructuralNetwork, complex: number): Map<number, number> {
  const terms = new Map<number, number>();
  for (let k = complexes.offsets[complex]!; k < complexes.offsets[complex + 1]!; k++) {
    terms.set(complexes.species[k]!, complexes.numerators[k]! / (complexes.denominators?.[k] ?? 1));
  }
  return terms;
}
