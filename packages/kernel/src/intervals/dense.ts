/** Solves a·x = right by elimination with row exchanges, in doubles; null where a pivot is lost in rounding. */
export function solveDense(a: readonly (readonly number[])[], right: readonly number[]): number[] | null {
  const solutions = eliminate(
    a.map((row, i) => [...row, right[i]!]),
    a.length,
  );
  return solutions && solutions.map((row) => row[0]!);
}

/** The inverse in doubles, or null where a pivot is lost in rounding. */
export function inverse(a: readonly (readonly number[])[]): number[][] | null {
  const size = a.length;
  return eliminate(
    a.map((row, i) => [...row, ...row.map((_, k) => (k === i ? 1 : 0))]),
    size,
  );
}

/** Gauss–Jordan elimination on [a | b], rows equilibrated; returns a⁻¹b by rows. */
function eliminate(work: number[][], size: number): number[][] | null {
  for (const row of work) {
    const largest = row.slice(0, size).reduce((most, entry) => Math.max(most, Math.abs(entry)), 0);
    if (!(largest > 0) || !Number.isFinite(largest)) return null;
    for (let k = 0; k < row.length; k++) row[k]! /= largest;
  }
  for (let k = 0; k < size; k++) {
    let chosen = k;
    for (let i = k + 1; i < size; i++) if (Math.abs(work[i]![k]!) > Math.abs(work[chosen]![k]!)) chosen = i;
    const pivotRow = work[chosen]!;
    const pivot = pivotRow[k]!;
    if (Math.abs(pivot) < 1e-14) return null;
    work[chosen] = work[k]!;
    work[k] = pivotRow;
    for (let j = k; j < pivotRow.length; j++) pivotRow[j]! /= pivot;
    for (let i = 0; i < size; i++) {
      const factor = work[i]![k]!;
      if (i === k || factor === 0) continue;
      for (let j = k; j < pivotRow.length; j++) work[i]![j]! -= factor * pivotRow[j]!;
    }
  }
  return work.map((row) => row.slice(size));
}
