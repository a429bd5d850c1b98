import type { SparsePattern } from '../problem.ts';
import type { SymbolicFactorization } from './symbolic.ts';

/** A factorisation in a fixed order of pivots, driven by tables: for systems too large to unroll. */
export interface TableSolver {
  /** Factorises shift · I − J; returns the largest multiplier |l|, NaN where something was not finite. */
  factor(entries: Float64Array, shift: number): number;
  /** Solves for `b` and puts the solution into `x`. */
  solve(b: Float64Array, x: Float64Array): void;
}

/** Up-looking factorisation by rows on the pattern of `symbolic`. */
export function tableSolver(pattern: SparsePattern, symbolic: SymbolicFactorization): TableSolver {
  const { size, order, place } = symbolic;
  const lower = byRows(symbolic.lower);
  const upper = joined(symbolic.upper);
  const lowerValues = new Float64Array(lower.columns.length);
  const upperValues = new Float64Array(upper.columns.length);
  const inverse = new Float64Array(size);
  const work = new Float64Array(size);
  const placed = Int32Array.from(pattern.columns, (column) => place[column]!);
  const { rowStart } = pattern;

  const factor = (entries: Float64Array, shift: number): number => {
    let growth = 0;
    for (let q = 0; q < size; q++) {
      const l0 = lower.start[q]!;
      const l1 = lower.start[q + 1]!;
      const u0 = upper.start[q]!;
      const u1 = upper.start[q + 1]!;
      for (let n = l0; n < l1; n++) work[lower.columns[n]!] = 0;
      for (let n = u0; n < u1; n++) work[upper.columns[n]!] = 0;
      work[q] = shift;
      const i = order[q]!;
      for (let e = rowStart[i]!; e < rowStart[i + 1]!; e++) work[placed[e]!]! -= entries[e]!;
      for (let n = l0; n < l1; n++) {
        const k = lower.columns[n]!;
        const multiplier = work[k]! * inverse[k]!;
        lowerValues[n] = multiplier;
        growth = Math.max(growth, Math.abs(multiplier));
        for (let m = upper.start[k]!; m < upper.start[k + 1]!; m++) {
          work[upper.columns[m]!]! -= multiplier * upperValues[m]!;
        }
      }
      for (let n = u0; n < u1; n++) upperValues[n] = work[upper.columns[n]!]!;
      inverse[q] = 1 / work[q]!;
    }
    return growth;
  };

  const solve = (b: Float64Array, x: Float64Array): void => {
    for (let q = 0; q < size; q++) {
      let sum = b[order[q]!]!;
      for (let n = lower.start[q]!; n < lower.start[q + 1]!; n++)
        sum -= lowerValues[n]! * work[lower.columns[n]!]!;
      work[q] = sum;
    }
    for (let q = size - 1; q >= 0; q--) {
      let sum = work[q]!;
      for (let n = upper.start[q]!; n < upper.start[q + 1]!; n++)
        sum -= upperValues[n]! * work[upper.columns[n]!]!;
      sum *= inverse[q]!;
      work[q] = sum;
      x[order[q]!] = sum;
    }
  };

  return { factor, solve };
}

/** Lists one after the other. */
function joined(lists: readonly Int32Array[]): { start: Int32Array; columns: Int32Array } {
  const start = new Int32Array(lists.length + 1);
  for (let q = 0; q < lists.length; q++) start[q + 1] = start[q]! + lists[q]!.length;
  const columns = new Int32Array(start[lists.length]!);
  for (let q = 0; q < lists.length; q++) columns.set(lists[q]!, start[q]);
  return { start, columns };
}

/** Columns of L (below the diagonal) turned into its rows, ascending. */
function byRows(lists: readonly Int32Array[]): { start: Int32Array; columns: Int32Array } {
  const start = new Int32Array(lists.length + 1);
  for (const rows of lists) for (const row of rows) start[row + 1]!++;
  for (let q = 0; q < lists.length; q++) start[q + 1]! += start[q]!;
  const next = start.slice();
  const columns = new Int32Array(start[lists.length]!);
  lists.forEach((rows, column) => {
    for (const row of rows) columns[next[row]!++] = column;
  });
  return { start, columns };
}
