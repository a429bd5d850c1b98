import type { SparseColumns } from '../exact/index.ts';
import { certifiedRank, modularRanks } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { stoichiometry } from '../network/index.ts';
import type { Partition } from './partition.ts';

/**
 * Rank s_i of the reaction vectors of each linkage class, proven; null for a class too large to be decided. `forest`
 * holds the arrows of a spanning forest, which span the same space, and `whole` is the rank of the network.
 */
export function ranksOfClasses(
  network: StructuralNetwork,
  linkage: Partition,
  forest: Int32Array,
  whole: number,
  checkpoint: () => void = () => undefined,
): (number | null)[] {
  if (linkage.count === 1) return [whole];
  // The ranks add up to at least that of the network, so with independent forest columns there is nothing to compute.
  if (whole === forest.length) return sizes(linkage).map((size) => size - 1);
  const { matrix, classOf, rowCounts } = apart(network, linkage, forest);
  const modular = modularRanks(matrix, classOf, linkage.count);
  const columns = columnsByClass(network, linkage, forest);
  return sizes(linkage).map((size, group) => {
    const lower = modular?.[group];
    // A minor of full size proves the rank; other classes are proven one by one.
    if (lower === Math.min(size - 1, rowCounts[group]!)) return lower;
    checkpoint();
    const own = columns.arrows.subarray(columns.offsets[group]!, columns.offsets[group + 1]!);
    return certifiedRank(submatrix(matrix, own));
  });
}

function sizes(linkage: Partition): number[] {
  return Array.from(
    { length: linkage.count },
    (_, group) => linkage.offsets[group + 1]! - linkage.offsets[group]!,
  );
}

/** The forest columns of N with rows of their own for each class: block diagonal, the rank is the sum of the s_i. */
function apart(
  network: StructuralNetwork,
  linkage: Partition,
  forest: Int32Array,
): { matrix: SparseColumns; classOf: Int32Array; rowCounts: Int32Array } {
  const { matrix } = stoichiometry(network, forest);
  const classOf = forest.map((arrow) => linkage.of[network.arrows.from[arrow]!]!);
  const byClass = columnsByClass(network, linkage, forest);
  const rows = new Int32Array(matrix.rows.length);
  const rowCounts = new Int32Array(linkage.count);
  const stamp = new Int32Array(network.species.length).fill(-1);
  const place = new Int32Array(network.species.length);
  let rowCount = 0;
  for (let group = 0; group < linkage.count; group++) {
    for (let i = byClass.offsets[group]!; i < byClass.offsets[group + 1]!; i++) {
      const column = byClass.arrows[i]!;
      for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
        const species = matrix.rows[k]!;
        if (stamp[species] !== group) {
          stamp[species] = group;
          place[species] = rowCount++;
          rowCounts[group]!++;
        }
        rows[k] = place[species]!;
      }
    }
  }
  return { matrix: { ...matrix, rowCount, rows }, classOf, rowCounts };
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

/** Some columns of a matrix over the rows they use. */
function submatrix(matrix: SparseColumns, columns: Int32Array): SparseColumns {
  const place = new Map<number, number>();
  const offsets = new Int32Array(columns.length + 1);
  const rows: number[] = [];
  const values: number[] = [];
  columns.forEach((column, j) => {
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      const row = place.get(matrix.rows[k]!) ?? place.size;
      place.set(matrix.rows[k]!, row);
      rows.push(row);
      values.push(matrix.values[k]!);
    }
    offsets[j + 1] = rows.length;
  });
  return {
    rowCount: place.size,
    columnCount: columns.length,
    offsets,
    rows: Int32Array.from(rows),
    values: Float64Array.from(values),
  };
}
