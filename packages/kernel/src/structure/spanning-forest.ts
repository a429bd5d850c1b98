import type { StructuralNetwork } from '../network/index.ts';
import { UnionFind } from './union-find.ts';

/** Arrows of a spanning forest of the graph of complexes, the earliest written first: n − ℓ of them. */
export function spanningForest(network: StructuralNetwork): Int32Array {
  const { from, to, count } = network.arrows;
  const sets = new UnionFind(network.complexes.count);
  const forest = new Int32Array(Math.max(0, network.complexes.count - 1));
  let end = 0;
  for (let arrow = 0; arrow < count; arrow++) {
    if (sets.union(from[arrow]!, to[arrow]!)) forest[end++] = arrow;
  }
  return forest.subarray(0, end);
}
