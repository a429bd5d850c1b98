import type { LeftKernel, SparseVector } from '../exact/index.ts';
import { leftKernel } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { stoichiometry } from '../network/index.ts';
import { canonicalOrder, independentFirst, lawBlocks } from './law-blocks.ts';
import type { LawBlock } from './law-blocks.ts';
import { nonnegativeLawsOf } from './nonnegative-laws.ts';
import { spanningForest } from './spanning-forest.ts';

/** Limits of the enumeration of extreme non-negative laws, in laws and in elementary steps. */
export const LAW_LIMITS = { rays: 10_000, steps: 100_000_000 } as const;

/** Linear functions of the species that no reaction changes: the left kernel of N. */
export interface ConservationLaws {
  /** Rank of N, proven. */
  readonly rank: number;
  /**
   * A basis of primitive integer laws: extreme non-negative ones first, in canonical order (by support, then by
   * coefficients), then enough others.
   */
  readonly basis: readonly SparseVector[];
  /** False where some laws are too long to be written; their number is still species − rank. */
  readonly complete: boolean;
  /** Extreme non-negative laws, primitive, in canonical order; those found before the limits where not complete. */
  readonly nonnegative: readonly SparseVector[];
  readonly nonnegativeComplete: boolean;
  /** The laws as they were first found, by blocks that share no species. */
  readonly blocks: readonly LawBlock[];
}

/**
 * Rank and conservation laws of a network, exactly. The columns of N along a spanning forest of the complexes span im N,
 * so only n − ℓ of them are needed. Null where the network is too large to be decided.
 */
export function conservationLaws(
  network: StructuralNetwork,
  checkpoint: () => void = () => undefined,
): ConservationLaws | null {
  const kernel = leftKernel(stoichiometry(network, spanningForest(network)).matrix, checkpoint);
  return kernel === null ? null : lawsOfKernel(kernel, checkpoint);
}

function lawsOfKernel(kernel: LeftKernel, checkpoint: () => void): ConservationLaws {
  const basis: SparseVector[] = [];
  const nonnegative: SparseVector[] = [];
  let nonnegativeComplete = kernel.complete;
  let steps: number = LAW_LIMITS.steps;
  const blocks = lawBlocks(kernel.basis);
  for (const block of blocks) {
    checkpoint();
    const limits = { rays: LAW_LIMITS.rays - nonnegative.length, steps };
    const found = nonnegativeLawsOf(block, limits);
    steps -= found.steps;
    nonnegativeComplete &&= found.complete;
    const extreme = canonicalOrder(found.laws);
    for (const law of extreme) nonnegative.push(law);
    for (const law of independentFirst(block, extreme)) basis.push(law);
  }
  const isNonnegative = (law: SparseVector) => law.values.every((value) => value > 0n);
  return {
    rank: kernel.rank,
    basis: [
      ...canonicalOrder(basis.filter(isNonnegative)),
      ...canonicalOrder(basis.filter((law) => !isNonnegative(law))),
    ],
    complete: kernel.complete,
    nonnegative: canonicalOrder(nonnegative),
    nonnegativeComplete,
    blocks,
  };
}
