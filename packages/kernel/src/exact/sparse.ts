/**
 * A sparse integer matrix by columns: column j holds `values[k]` in row `rows[k]` for k in offsets[j] .. offsets[j+1]-1,
 * rows ascending, values integers below 2^53 in absolute value and not 0.
 */
export interface SparseColumns {
  readonly rowCount: number;
  readonly columnCount: number;
  readonly offsets: Int32Array;
  readonly rows: Int32Array;
  readonly values: Float64Array;
}

/** An integer vector by its entries that are not 0, indices ascending. */
export interface SparseVector {
  readonly indices: Int32Array;
  readonly values: readonly bigint[];
}

/** Positions of the entries of each row: those of row i are `positions[offsets[i] .. offsets[i+1]-1]`, in column order. */
export interface RowIndex {
  readonly offsets: Int32Array;
  readonly columns: Int32Array;
  /** Where the entry stands in the arrays of the columns. */
  readonly positions: Int32Array;
}

/** Groups the entries of a matrix by row; linear. */
export function rowIndex(matrix: {
  readonly rowCount: number;
  readonly columnCount: number;
  readonly offsets: Int32Array;
  readonly rows: Int32Array;
}): RowIndex {
  const entries = matrix.offsets[matrix.columnCount]!;
  const offsets = new Int32Array(matrix.rowCount + 1);
  for (let k = 0; k < entries; k++) offsets[matrix.rows[k]! + 1]!++;
  for (let row = 0; row < matrix.rowCount; row++) offsets[row + 1]! += offsets[row]!;
  const next = offsets.slice(0, matrix.rowCount);
  const columns = new Int32Array(entries);
  const positions = new Int32Array(entries);
  for (let column = 0; column < matrix.columnCount; column++) {
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      const slot = next[matrix.rows[k]!]!++;
      columns[slot] = column;
      positions[slot] = k;
    }
  }
  return { offsets, columns, positions };
}

/**
 * Rank and left kernel over the rationals, proven.
 *
 * The rank is at least `rank` because a minor of that size is not zero (modulo a prime, or a product along a forest),
 * and at most `rank` because the vectors of `basis` were checked over the integers and are independent, or because the
 * matrix has no more rows or columns. `basis` holds primitive integer vectors, their first entry positive, each with an
 * index of its own where the others are 0. `complete` is false where some vector is too long to be written
 * (the rank is proven all the same).
 */
export interface LeftKernel {
  readonly rank: number;
  readonly basis: readonly SparseVector[];
  readonly complete: boolean;
}
