import type { SparseColumns } from '../sparse.ts';
import { residueOf } from './field.ts';

/** A sparse matrix over Z/p by columns; values are residues that are not 0. */
export interface ModularColumns {
  readonly rowCount: number;
  readonly columnCount: number;
  readonly offsets: Int32Array;
  readonly rows: Int32Array;
  readonly values: Int32Array;
}

/** The residues of an integer matrix; entries that p divides vanish. */
export function modularColumns(matrix: SparseColumns, p: number): ModularColumns {
  const capacity = matrix.offsets[matrix.columnCount]!;
  const offsets = new Int32Array(matrix.columnCount + 1);
  const rows = new Int32Array(capacity);
  const values = new Int32Array(capacity);
  let end = 0;
  for (let column = 0; column < matrix.columnCount; column++) {
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      const value = residueOf(matrix.values[k]!, p);
      if (value === 0) continue;
      rows[end] = matrix.rows[k]!;
      values[end++] = value;
    }
    offsets[column + 1] = end;
  }
  return {
    rowCount: matrix.rowCount,
    columnCount: matrix.columnCount,
    offsets,
    rows: rows.subarray(0, end),
    values: values.subarray(0, end),
  };
}
