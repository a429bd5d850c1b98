import { absolute, floorDivide } from './integers.ts';
import type { IntegerMatrix } from './matrix.ts';
import { transpose } from './matrix.ts';

/**
 * Row-style Hermite normal form: `form` = `transform` · matrix with a unimodular `transform`. The first `rank` rows of
 * `form` are its non-zero rows, pivots positive and strictly to the right of those above, entries above a pivot in
 * [0, pivot).
 */
export interface HermiteForm {
  readonly rank: number;
  readonly form: readonly (readonly bigint[])[];
  readonly transform: readonly (readonly bigint[])[];
  readonly pivotColumns: readonly number[];
}

/**
 * Hermite normal form by Euclid's algorithm on rows, always dividing by the entry of least absolute value. (Hermite
 * 1851; for the matrices of reaction networks entries stay short.)
 */
export function hermiteForm(matrix: IntegerMatrix): HermiteForm {
  const rows = matrix.entries.map((row) => [...row]);
  const transform = rows.map((_, i) => rows.map((_, j) => (i === j ? 1n : 0n)));
  const pivotColumns: number[] = [];
  for (let column = 0; column < matrix.columns && pivotColumns.length < rows.length; column++) {
    const top = pivotColumns.length;
    if (!gatherInto(rows, transform, column, top)) continue;
    const pivot = rows[top]![column]!;
    if (pivot < 0n) {
      negateRow(rows, top);
      negateRow(transform, top);
    }
    for (let above = 0; above < top; above++) {
      const times = floorDivide(rows[above]![column]!, absolute(pivot));
      subtractRow(rows, above, top, times);
      subtractRow(transform, above, top, times);
    }
    pivotColumns.push(column);
  }
  return { rank: pivotColumns.length, form: rows, transform, pivotColumns };
}

/**
 * A basis of the lattice { u ∈ Z^columns : matrix · u = 0 }: every integer solution is an integer combination of it.
 */
export function integerKernel(matrix: IntegerMatrix): bigint[][] {
  const { rank, transform } = hermiteForm(transpose(matrix));
  return transform.slice(rank).map((row) => [...row]);
}

/** Euclid's algorithm in one column below `top`; leaves the gcd at `top` and zeros under it. */
function gatherInto(rows: bigint[][], transform: bigint[][], column: number, top: number): boolean {
  for (;;) {
    let least = -1;
    let others = 0;
    for (let row = top; row < rows.length; row++) {
      const entry = rows[row]![column]!;
      if (entry === 0n) continue;
      others++;
      if (least < 0 || absolute(entry) < absolute(rows[least]![column]!)) least = row;
    }
    if (least < 0) return false;
    swapRows(rows, least, top);
    swapRows(transform, least, top);
    if (others === 1) return true;
    const pivot = rows[top]![column]!;
    for (let row = top + 1; row < rows.length; row++) {
      const times = nearestQuotient(rows[row]![column]!, pivot);
      subtractRow(rows, row, top, times);
      subtractRow(transform, row, top, times);
    }
  }
}

/** The integer nearest to a / b: remainders halve, which keeps the transform short. */
function nearestQuotient(a: bigint, b: bigint): bigint {
  return floorDivide(2n * a + b, 2n * b);
}

function swapRows(rows: bigint[][], i: number, j: number): void {
  if (i !== j) [rows[i], rows[j]] = [rows[j]!, rows[i]!];
}

function negateRow(rows: bigint[][], i: number): void {
  rows[i] = rows[i]!.map((entry) => -entry);
}

function subtractRow(rows: bigint[][], target: number, source: number, times: bigint): void {
  if (times === 0n) return;
  const from = rows[source]!;
  rows[target] = rows[target]!.map((entry, k) => entry - times * from[k]!);
}
