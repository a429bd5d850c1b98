import { determinant, matrixOfRows } from '../../exact/index.ts';

/**
 * Exact determinant of a square matrix of safe integers, by Bareiss's elimination in doubles while every product stays
 * below 2^53, on long integers beyond.
 */
export function smallDeterminant(matrix: readonly (readonly number[])[]): bigint {
  const fast = inDoubles(matrix.map((row) => [...row]));
  if (fast !== null) return BigInt(fast);
  return determinant(
    matrixOfRows(
      matrix.map((row) => row.map(BigInt)),
      matrix.length,
    ),
  );
}

function inDoubles(work: number[][]): number | null {
  const size = work.length;
  let sign = 1;
  let previous = 1;
  for (let k = 0; k < size; k++) {
    const chosen = work.findIndex((row, i) => i >= k && row[k] !== 0);
    if (chosen < 0) return 0;
    if (chosen !== k) {
      [work[chosen], work[k]] = [work[k]!, work[chosen]!];
      sign = -sign;
    }
    const pivotRow = work[k]!;
    const pivot = pivotRow[k]!;
    for (let i = k + 1; i < size; i++) {
      const row = work[i]!;
      const factor = row[k]!;
      for (let j = k + 1; j < size; j++) {
        const kept = row[j]! * pivot;
        const taken = factor * pivotRow[j]!;
        if (Math.abs(kept) > Number.MAX_SAFE_INTEGER / 2 || Math.abs(taken) > Number.MAX_SAFE_INTEGER / 2)
          return null;
        row[j] = (kept - taken) / previous;
      }
    }
    previous = pivot;
  }
  return size === 0 ? 1 : sign * work[size - 1]![size - 1]!;
}
