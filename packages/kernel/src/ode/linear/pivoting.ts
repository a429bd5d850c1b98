import type { SparsePattern } from '../problem.ts';

/** A factorisation that chooses its pivots by their size. */
export interface PivotingSolver {
  /** Factorises shift · I − J, J given by its entries in the order of the pattern. False where the matrix is singular. */
  factor(entries: Float64Array, shift: number): boolean;
  /** Solves in place. */
  solve(b: Float64Array): void;
}

/**
 * Left-looking sparse factorisation by columns with partial pivoting (Gilbert, Peierls 1988); the columns come in the
 * given order, rows are chosen by size, the diagonal one where it is at least a tenth of the largest. Used where a fixed order of pivots lost accuracy.
 */
export function pivotingSolver(pattern: SparsePattern, order: Int32Array): PivotingSolver {
  const { size } = pattern;
  const columns = transpose(pattern);
  const lower: { rows: number[]; values: number[] }[] = [];
  const upper: { places: number[]; values: number[]; pivot: number }[] = [];
  const pivotRow = new Int32Array(size);
  /** Place of an original row, -1 until it was chosen as pivot. */
  const placeOfRow = new Int32Array(size);
  const work = new Float64Array(size);
  const solution = new Float64Array(size);

  const factor = (entries: Float64Array, shift: number): boolean => {
    lower.length = 0;
    upper.length = 0;
    placeOfRow.fill(-1);
    for (let q = 0; q < size; q++) {
      const column = order[q]!;
      const { topological, rest } = reach(column);
      for (let e = columns.start[column]!; e < columns.start[column + 1]!; e++) {
        work[columns.rows[e]!]! -= entries[columns.entry[e]!]!;
      }
      work[column]! += shift;
      const part: { places: number[]; values: number[]; pivot: number } = {
        places: [],
        values: [],
        pivot: 0,
      };
      for (const place of topological) {
        const row = pivotRow[place]!;
        const value = work[row]!;
        work[row] = 0;
        part.places.push(place);
        part.values.push(value);
        const { rows, values } = lower[place]!;
        for (let n = 0; n < rows.length; n++) work[rows[n]!]! -= values[n]! * value;
      }
      const chosen = choosePivot(rest, column);
      if (chosen < 0) return false;
      part.pivot = work[chosen]!;
      upper.push(part);
      pivotRow[q] = chosen;
      placeOfRow[chosen] = q;
      const below: { rows: number[]; values: number[] } = { rows: [], values: [] };
      for (const row of rest) {
        if (row !== chosen) {
          below.rows.push(row);
          below.values.push(work[row]! / part.pivot);
        }
        work[row] = 0;
      }
      lower.push(below);
    }
    return true;
  };

  /** The places already eliminated that reach into a column, in an order that respects their dependence, and the other rows it fills. */
  const mark = new Uint8Array(size);
  const reach = (column: number): { topological: number[]; rest: number[] } => {
    const postorder: number[] = [];
    const rest: number[] = [];
    const stack: { row: number; next: number }[] = [];
    const visit = (row: number): void => {
      if (mark[row] === 1) return;
      mark[row] = 1;
      if (placeOfRow[row]! < 0) rest.push(row);
      else stack.push({ row, next: 0 });
    };
    const start = (row: number): void => {
      visit(row);
      for (let top = stack.at(-1); top !== undefined; top = stack.at(-1)) {
        const place = placeOfRow[top.row]!;
        const below = lower[place]!.rows;
        if (top.next < below.length) {
          visit(below[top.next++]!);
        } else {
          postorder.push(place);
          stack.pop();
        }
      }
    };
    for (let e = columns.start[column]!; e < columns.start[column + 1]!; e++) start(columns.rows[e]!);
    start(column);
    for (const place of postorder) mark[pivotRow[place]!] = 0;
    for (const row of rest) mark[row] = 0;
    return { topological: postorder.reverse(), rest };
  };

  const choosePivot = (rows: readonly number[], diagonal: number): number => {
    let best = -1;
    let largest = 0;
    for (const row of rows) {
      const magnitude = Math.abs(work[row]!);
      if (magnitude > largest) {
        largest = magnitude;
        best = row;
      }
    }
    if (!Number.isFinite(largest)) best = -1;
    else if (placeOfRow[diagonal]! < 0 && Math.abs(work[diagonal]!) >= 0.1 * largest && largest > 0)
      best = diagonal;
    if (best < 0) for (const row of rows) work[row] = 0;
    return best;
  };

  const solve = (b: Float64Array): void => {
    for (let q = 0; q < size; q++) {
      const value = b[pivotRow[q]!]!;
      solution[q] = value;
      const { rows, values } = lower[q]!;
      for (let n = 0; n < rows.length; n++) b[rows[n]!]! -= values[n]! * value;
    }
    for (let q = size - 1; q >= 0; q--) {
      const { places, values, pivot } = upper[q]!;
      const value = solution[q]! / pivot;
      solution[q] = value;
      for (let n = 0; n < places.length; n++) solution[places[n]!]! -= values[n]! * value;
    }
    for (let q = 0; q < size; q++) b[order[q]!] = solution[q]!;
  };

  return { factor, solve };
}

/** The pattern by columns; `entry` is the place of each entry in the pattern by rows. */
function transpose(pattern: SparsePattern): { start: Int32Array; rows: Int32Array; entry: Int32Array } {
  const { size, rowStart, columns } = pattern;
  const start = new Int32Array(size + 1);
  for (const column of columns) start[column + 1]!++;
  for (let j = 0; j < size; j++) start[j + 1]! += start[j]!;
  const next = start.slice();
  const rows = new Int32Array(columns.length);
  const entry = new Int32Array(columns.length);
  for (let i = 0; i < size; i++) {
    for (let e = rowStart[i]!; e < rowStart[i + 1]!; e++) {
      const place = next[columns[e]!]!++;
      rows[place] = i;
      entry[place] = e;
    }
  }
  return { start, rows, entry };
}
