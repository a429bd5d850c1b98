import type { SparseVector } from '../exact/index.ts';
import { independentSelection } from '../exact/index.ts';
import { membersOf, partitionByLabel } from './partition.ts';
import { UnionFind } from './union-find.ts';

/**
 * Laws that share species, directly or through others. Laws of different blocks have no species in common, so extreme
 * laws, bases and positivity are settled block by block.
 */
export interface LawBlock {
  readonly laws: readonly SparseVector[];
  /** For each law a species that occurs in no other law of the block. */
  readonly own: Int32Array;
}

/** Blocks larger than this keep the order of their basis instead of putting extreme laws first. */
const SELECTION_LIMIT = 2000;

/** Splits a basis of laws, each with a species of its own, into blocks. */
export function lawBlocks(basis: readonly SparseVector[]): LawBlock[] {
  let speciesCount = 0;
  for (const law of basis) speciesCount = Math.max(speciesCount, law.indices.at(-1)! + 1);
  const firstLaw = new Int32Array(speciesCount).fill(-1);
  const uses = new Int32Array(speciesCount);
  const sets = new UnionFind(basis.length);
  basis.forEach((law, j) => {
    for (const species of law.indices) {
      uses[species]!++;
      if (firstLaw[species]! < 0) firstLaw[species] = j;
      else sets.union(firstLaw[species]!, j);
    }
  });
  const blocks = partitionByLabel(sets.labels());
  return Array.from({ length: blocks.count }, (_, block) => {
    const laws = Array.from(membersOf(blocks, block), (j) => basis[j]!);
    const own = laws.map((law) => law.indices.find((species) => uses[species] === 1)!);
    return { laws, own: Int32Array.from(own) };
  });
}

/** A basis of the block: as many of the given laws as are independent, in order, then laws of the block. */
export function independentFirst(
  block: LawBlock,
  preferred: readonly SparseVector[],
): readonly SparseVector[] {
  const size = block.laws.length;
  if (size === 1) return preferred.length === 1 ? preferred : block.laws;
  if (size > SELECTION_LIMIT) return block.laws;
  const candidates = [...preferred, ...block.laws];
  const place = new Map(Array.from(block.own, (species, j) => [species, j]));
  const coordinates = candidates.map((law) => {
    const entries = Array.from({ length: size }, () => 0n);
    law.indices.forEach((species, i) => {
      const j = place.get(species);
      if (j !== undefined) entries[j] = law.values[i]!;
    });
    return entries;
  });
  return independentSelection(coordinates, size).map((index) => candidates[index]!);
}

/** Laws by their species in order of first appearance, then by coefficients. */
export function canonicalOrder(laws: readonly SparseVector[]): SparseVector[] {
  return [...laws].sort((a, b) => {
    const shared = Math.min(a.indices.length, b.indices.length);
    for (let i = 0; i < shared; i++) {
      if (a.indices[i] !== b.indices[i]) return a.indices[i]! - b.indices[i]!;
    }
    if (a.indices.length !== b.indices.length) return a.indices.length - b.indices.length;
    const differing = a.values.findIndex((value, i) => value !== b.values[i]);
    return differing < 0 ? 0 : a.values[differing]! < b.values[differing]! ? -1 : 1;
  });
}
