import { certifiedRank } from '../exact/index.ts';
import type { SparseColumns } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { stoichiometry } from '../network/index.ts';
import type { Partition } from './partition.ts';

/**
 * Rank s_i of the reaction vectors of each linkage class, proven; null for a class too large to be decided. `forest`
 * holds the arrows of a spanning forest, which span the same space.
 */
export function ranksOfClasses(
  network: StructuralNetwork,
  linkage: Partition,
  forest: Int32Array,
  whole: number,
  checkpoint: () => void = () => undefined,
): (number | null)[] {
  if (linkage.count === 1) return [whole];
  const { matrix } = stoichiometry(network, forest);
  const columns = columnsByClass(network, linkage, forest);
  const local = new Int32Array(network.species.length).fill(-1);
  return Array.from({ length: linkage.count }, (_, group) => {
    const own = columns.arrows.subarray(columns.offsets[group]!, columns.offsets[group + 1]!);
    // Two different complexes have a reaction vector that is not 0.
    if (own.length < 2) return own.length;
    checkpoint();
    return certifiedRank(submatrix(matrix, own, local));
  });
}

/** Columns of the forest matrix by linkage class. */
function columnsByClass(
  network: StructuralNetwork,
  linkage: Partition,
  forest: Int32Array,
): { offsets: Int32Array; arrows: Int32Array } {
  const offsets = new Int32Array(linkage.count + 1);
  for (let group = 0; group < linkage.count; group++) {
    const size = linkage.offsets[group + 1]! - linkage.offsets[group]!;
    offsets[group + 1] = offsets[group]! + size - 1;
  }
  const next = offsets.slice(0, linkage.count);
  const arrows = new Int32Array(forest.length);
  forest.forEach((arrow, column) => {
    arrows[next[linkage.of[network.arrows.from[arrow]!]!]!++] = column;
  });
  return { offsets, arrows };
}

/** Some columns of a matrix over the rows they use. `local` holds -1 everywhere and is left so. */
function submatrix(matrix: SparseColumns, columns: Int32Array, local: Int32Array): SparseColumns {
  const offsets = new Int32Array(columns.length + 1);
  columns.forEach((column, j) => {
    offsets[j + 1] = offsets[j]! + matrix.offsets[column + 1]! - matrix.offsets[column]!;
  });
  const rows = new Int32Array(offsets[columns.length]!);
  const values = new Float64Array(rows.length);
  const used: number[] = [];
  let end = 0;
  for (const column of columns) {
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      const row = matrix.rows[k]!;
      if (local[row]! < 0) {
        local[row] = used.length;
        used.push(row);
      }
      rows[end] = local[row]!;
      values[end++] = matrix.values[k]!;
    }
  }
  for (const row of used) local[row] = -1;
  return { rowCount: used.length, columnCount: columns.length, offsets, rows, values };
}
