import type { StructuralNetwork } from '../network/index.ts';
import type { ConservationLaws } from './conservation-laws.ts';
import { conservationLaws } from './conservation-laws.ts';
import type { Conservative } from './conservative.ts';
import { conservative } from './conservative.ts';
import { consistent } from './consistent.ts';
import type { Siphon } from './critical-siphons.ts';
import { judgeSiphons } from './critical-siphons.ts';
import type { ClassNumbers } from './deficiency.ts';
import { classNumbers, deficiency } from './deficiency.ts';
import { linkageClasses } from './linkage-classes.ts';
import { minimalSiphons } from './minimal-siphons.ts';
import type { Partition } from './partition.ts';
import { ranksOfClasses } from './ranks-of-classes.ts';
import { isReversible } from './reversibility.ts';
import { spanningForest } from './spanning-forest.ts';
import { strongLinkageClasses, terminalFlags } from './strong-linkage-classes.ts';

/** Called between and within steps: share done, what is being done; may throw to end the analysis. */
export type Checkpoint = (progress?: number, words?: string) => void;

/** The classes of a network, its rank and its deficiency; nulls where the network is too large for a proven rank. */
export interface Figures {
  readonly network: StructuralNetwork;
  readonly linkage: Partition;
  readonly strong: Partition;
  /** 1 for each strong linkage class that no arrow leaves. */
  readonly terminal: Uint8Array;
  readonly terminalCount: number;
  readonly reversible: boolean;
  readonly weaklyReversible: boolean;
  readonly laws: ConservationLaws | null;
  readonly rank: number | null;
  readonly deficiency: number | null;
}

/** Every structural quantity of a network, exact. A null says that the network is too large for a proven answer. */
export interface Structure extends Figures {
  readonly classes: readonly ClassNumbers[];
  readonly conservative: Conservative;
  readonly consistent: boolean | null;
  readonly siphons: { readonly siphons: readonly Siphon[]; readonly complete: boolean };
}

/** Computes classes, rank with its conservation laws, and deficiency. */
export function figures(network: StructuralNetwork, checkpoint: Checkpoint = () => undefined): Figures {
  checkpoint(0.02, 'linkage classes');
  const linkage = linkageClasses(network);
  const reversible = isReversible(network);
  const strong = reversible ? linkage : strongLinkageClasses(network);
  const terminal = terminalFlags(network, strong);
  checkpoint(0.1, 'rank and conservation laws');
  const laws = conservationLaws(network, checkpoint);
  const rank = laws?.rank ?? null;
  return {
    network,
    linkage,
    strong,
    terminal,
    terminalCount: terminal.reduce((sum, flag) => sum + flag, 0),
    reversible,
    weaklyReversible: strong.count === linkage.count,
    laws,
    rank,
    deficiency: deficiency(network.complexes.count, linkage.count, rank),
  };
}

/** Computes the whole structure of a network. Deterministic; work is bounded by counted operations. */
export function analyse(network: StructuralNetwork, checkpoint: Checkpoint = () => undefined): Structure {
  const found = figures(network, checkpoint);
  const { linkage, strong, terminal, laws, rank } = found;
  checkpoint(0.5, 'ranks of the linkage classes');
  const ranks =
    rank === null ? [] : ranksOfClasses(network, linkage, spanningForest(network), rank, checkpoint);
  checkpoint(0.65, 'consistency');
  const balanced = consistent(network, strong);
  checkpoint(0.75, 'minimal siphons');
  const siphons = minimalSiphons(network, checkpoint);
  checkpoint(0.9, 'critical siphons');
  return {
    ...found,
    classes: classNumbers(linkage, strong, terminal, ranks),
    conservative: laws === null ? { holds: null } : conservative(laws, network.species.length),
    consistent: balanced,
    siphons: {
      siphons: judgeSiphons(network, siphons.siphons, laws, checkpoint),
      complete: siphons.complete,
    },
  };
}
