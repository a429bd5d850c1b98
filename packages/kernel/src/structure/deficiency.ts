import type { Partition } from './partition.ts';

/** Numbers of one linkage class; null where the rank could not be decided. */
export interface ClassNumbers {
  readonly complexes: number;
  readonly rank: number | null;
  readonly deficiency: number | null;
  readonly terminalStrongClasses: number;
  /** A linkage class is weakly reversible when it is one strong linkage class. */
  readonly weaklyReversible: boolean;
}

/** δ = n − ℓ − s (Feinberg 1972); null where the rank is. */
export function deficiency(complexes: number, linkageClasses: number, rank: number | null): number | null {
  return rank === null ? null : complexes - linkageClasses - rank;
}

/** The numbers of every linkage class: δ_i = n_i − 1 − s_i, its terminal classes, weak reversibility. */
export function classNumbers(
  linkage: Partition,
  strong: Partition,
  terminal: Uint8Array,
  ranks: readonly (number | null)[],
): ClassNumbers[] {
  const strongCounts = new Int32Array(linkage.count);
  const terminalCounts = new Int32Array(linkage.count);
  for (let group = 0; group < strong.count; group++) {
    const parent = linkage.of[strong.members[strong.offsets[group]!]!]!;
    strongCounts[parent]!++;
    terminalCounts[parent]! += terminal[group]!;
  }
  return Array.from({ length: linkage.count }, (_, group) => {
    const complexes = linkage.offsets[group + 1]! - linkage.offsets[group]!;
    const rank = ranks[group] ?? null;
    return {
      complexes,
      rank,
      deficiency: deficiency(complexes, 1, rank),
      terminalStrongClasses: terminalCounts[group]!,
      weaklyReversible: strongCounts[group] === 1,
    };
  });
}
