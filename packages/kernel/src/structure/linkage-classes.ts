import type { StructuralNetwork } from '../network/index.ts';
import type { Partition } from './partition.ts';
import { partitionByLabel } from './partition.ts';
import { UnionFind } from './union-find.ts';

/** Linkage classes: connected components of the graph of complexes, direction ignored (Horn, Jackson 1972). */
export function linkageClasses(network: StructuralNetwork): Partition {
  const { from, to, count } = network.arrows;
  const sets = new UnionFind(network.complexes.count);
  for (let arrow = 0; arrow < count; arrow++) sets.union(from[arrow]!, to[arrow]!);
  return partitionByLabel(sets.labels());
}
