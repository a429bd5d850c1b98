import { matrixOfRows, rankOf } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { stoichiometry } from '../network/index.ts';
import { linkageClasses } from '../structure/linkage-classes.ts';
import { membersOf } from '../structure/partition.ts';
import {
  nonterminalComplexes,
  strongLinkageClasses,
  terminalFlags,
} from '../structure/strong-linkage-classes.ts';

/** A linkage class with the quantities theorems ask for. */
export interface LinkageClassFacts {
  readonly complexes: readonly number[];
  readonly rank: number;
  readonly deficiency: number;
  readonly terminalStrongClasses: readonly (readonly number[])[];
}

export interface SiphonFacts {
  readonly species: readonly number[];
  readonly critical: boolean;
  /** A non-negative law supported in the siphon, by species, where it is not critical. */
  readonly law: readonly bigint[] | null;
}

/** Structural quantities in the form theorems use them. */
export interface StructuralFacts {
  readonly rank: number;
  readonly deficiency: number;
  readonly linkageClasses: readonly LinkageClassFacts[];
  readonly strongClassOf: Int32Array;
  readonly nonterminalComplexes: readonly number[];
  readonly siphons: { readonly siphons: readonly SiphonFacts[]; readonly complete: boolean };
}

/** Collects the quantities of a structural network. */
export function structuralFacts(network: StructuralNetwork): StructuralFacts {
  const linkage = linkageClasses(network);
  const strong = strongLinkageClasses(network);
  const terminal = terminalFlags(network, strong);
  const all = Int32Array.from({ length: network.arrows.count }, (_, i) => i);
  const rankAmong = (arrows: Int32Array): number => {
    const { matrix } = stoichiometry(network, arrows);
    const rows = Array.from(arrows, (_, j) => {
      const row = network.species.map(() => 0n);
      for (let k = matrix.offsets[j]!; k < matrix.offsets[j + 1]!; k++)
        row[matrix.rows[k]!] = BigInt(matrix.values[k]!);
      return row;
    });
    return rankOf(matrixOfRows(rows, network.species.length));
  };
  const rank = rankAmong(all);
  const classes = Array.from({ length: linkage.count }, (_, group): LinkageClassFacts => {
    const complexes = Array.from(membersOf(linkage, group));
    const own = rankAmong(all.filter((arrow) => linkage.of[network.arrows.from[arrow]!] === group));
    const strongHere = [...new Set(complexes.map((complex) => strong.of[complex]!))];
    return {
      complexes,
      rank: own,
      deficiency: complexes.length - 1 - own,
      terminalStrongClasses: strongHere
        .filter((s) => terminal[s] === 1)
        .map((s) => Array.from(membersOf(strong, s))),
    };
  });
  return {
    rank,
    deficiency: network.complexes.count - linkage.count - rank,
    linkageClasses: classes,
    strongClassOf: strong.of,
    nonterminalComplexes: Array.from(nonterminalComplexes(strong, terminal)),
    siphons: { siphons: [], complete: false },
  };
}
