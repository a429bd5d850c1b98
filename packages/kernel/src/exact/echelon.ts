import type { IntegerMatrix } from './matrix.ts';

/**
 * Reduced echelon form over the integers: row k of `rows` has `pivot` in column `pivotColumns[k]` and 0 in every other
 * pivot column; rows / pivot is the reduced echelon form over the rationals. `pivotRows[k]` is the row of the given
 * matrix that was chosen k-th, so that the minor of pivot rows and columns is ±`pivot` (not zero).
 */
export interface Echelon {
  readonly rank: number;
  readonly columns: number;
  readonly rows: readonly (readonly bigint[])[];
  readonly pivot: bigint;
  readonly pivotRows: readonly number[];
  readonly pivotColumns: readonly number[];
  /** Number of row exchanges modulo 2 as a sign: the determinant of a regular square matrix is sign · pivot. */
  readonly sign: 1 | -1;
}

/**
 * Fraction-free Gauss–Jordan elimination: every division is exact, entries are minors of the matrix and so stay as
 * short as the result requires (Bareiss 1968). Columns are taken from left to right, within a column the entry of
 * least absolute value not zero, so the result is deterministic.
 */
export function echelon(matrix: IntegerMatrix): Echelon {
  const work = matrix.entries.map((row) => [...row]);
  const order = work.map((_, row) => row);
  const pivotColumns: number[] = [];
  let previous = 1n;
  let sign: 1 | -1 = 1;
  for (let column = 0; column < matrix.columns && pivotColumns.length < work.length; column++) {
    const top = pivotColumns.length;
    const chosen = smallestPivot(work, column, top);
    if (chosen < 0) continue;
    if (chosen !== top) {
      [work[chosen], work[top]] = [work[top]!, work[chosen]!];
      [order[chosen], order[top]] = [order[top]!, order[chosen]!];
      sign = sign === 1 ? -1 : 1;
    }
    const pivotRow = work[top]!;
    const pivot = pivotRow[column]!;
    for (let row = 0; row < work.length; row++) {
      if (row !== top) work[row] = eliminate(work[row]!, pivotRow, column, pivot, previous);
    }
    pivotColumns.push(column);
    previous = pivot;
  }
  const rank = pivotColumns.length;
  return {
    rank,
    columns: matrix.columns,
    rows: work.slice(0, rank),
    pivot: previous,
    pivotRows: order.slice(0, rank),
    pivotColumns,
    sign,
  };
}

/** Rank over the rationals. */
export function rankOf(matrix: IntegerMatrix): number {
  return echelon(matrix).rank;
}

/** Determinant of a square integer matrix; 1 for size 0. */
export function determinant(matrix: IntegerMatrix): bigint {
  if (matrix.rows !== matrix.columns) throw new RangeError('Only square matrices have a determinant.');
  const form = echelon(matrix);
  if (form.rank < matrix.rows) return 0n;
  return form.sign === 1 ? form.pivot : -form.pivot;
}

function smallestPivot(work: readonly bigint[][], column: number, top: number): number {
  let chosen = -1;
  let least = 0n;
  for (let row = top; row < work.length; row++) {
    const entry = work[row]![column]!;
    if (entry === 0n) continue;
    const size = entry < 0n ? -entry : entry;
    if (chosen < 0 || size < least) {
      chosen = row;
      least = size;
      if (size === 1n) break;
    }
  }
  return chosen;
}

function eliminate(
  row: readonly bigint[],
  pivotRow: readonly bigint[],
  column: number,
  pivot: bigint,
  previous: bigint,
): bigint[] {
  const factor = row[column]!;
  if (factor === 0n) return pivot === previous ? [...row] : row.map((entry) => (entry * pivot) / previous);
  return row.map((entry, k) => (entry * pivot - factor * pivotRow[k]!) / previous);
}
