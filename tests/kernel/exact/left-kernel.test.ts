import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import type { LeftKernel, SparseColumns } from '../../../packages/kernel/src/exact/index.ts';
import { certifiedRank, leftKernel, matrixOfRows, rankOf } from '../../../packages/kernel/src/exact/index.ts';

/** A sparse matrix from its columns, each a list of [row, value]. */
function sparse(
  rowCount: number,
  columns: readonly (readonly (readonly [number, number])[])[],
): SparseColumns {
  const offsets = new Int32Array(columns.length + 1);
  columns.forEach((column, j) => (offsets[j + 1] = offsets[j]! + column.length));
  const sorted = columns.map((column) => [...column].sort((a, b) => a[0] - b[0]));
  return {
    rowCount,
    columnCount: columns.length,
    offsets,
    rows: Int32Array.from(sorted.flat().map(([row]) => row)),
    values: Float64Array.from(sorted.flat().map(([, value]) => value)),
  };
}

function dense(matrix: SparseColumns): bigint[][] {
  const rows = Array.from({ length: matrix.rowCount }, () =>
    Array.from({ length: matrix.columnCount }, () => 0n),
  );
  for (let column = 0; column < matrix.columnCount; column++) {
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      rows[matrix.rows[k]!]![column] = BigInt(matrix.values[k]!);
    }
  }
  return rows;
}

/** The judge: vectors annihilate the matrix, are independent, and are as many as exact elimination leaves. */
function expectProven(matrix: SparseColumns, kernel: LeftKernel | null): void {
  const rows = dense(matrix);
  const rank = rankOf(matrixOfRows(rows, matrix.columnCount));
  expect(kernel).not.toBeNull();
  expect(kernel!.rank).toBe(rank);
  expect(kernel!.complete).toBe(true);
  expect(kernel!.basis).toHaveLength(matrix.rowCount - rank);
  const vectors = kernel!.basis.map(({ indices, values }) => {
    const full = Array.from({ length: matrix.rowCount }, () => 0n);
    indices.forEach((row, i) => (full[row] = values[i]!));
    expect(values[0]! > 0n).toBe(true);
    expect([...indices]).toEqual([...indices].sort((a, b) => a - b));
    return full;
  });
  for (const vector of vectors) {
    for (let column = 0; column < matrix.columnCount; column++) {
      expect(vector.reduce((sum, entry, row) => sum + entry * rows[row]![column]!, 0n)).toBe(0n);
    }
  }
  expect(rankOf(matrixOfRows(vectors, matrix.rowCount))).toBe(vectors.length);
}

function columnsOf(rowCount: number, size: { min: number; max: number }, largest: number) {
  return fc.array(
    fc
      .uniqueArray(fc.tuple(fc.nat(rowCount - 1), fc.integer({ min: -largest, max: largest })), {
        selector: ([row]) => row,
        maxLength: 4,
      })
      .map((column) => column.filter(([, value]) => value !== 0)),
    { minLength: size.min, maxLength: size.max },
  );
}

describe('certified left kernel', () => {
  test('agrees with exact elimination on random sparse matrices', () => {
    const matrices = fc
      .integer({ min: 1, max: 30 })
      .chain((rows) => columnsOf(rows, { min: 0, max: 40 }, 3).map((columns) => sparse(rows, columns)));
    fc.assert(
      fc.property(matrices, (matrix) => {
        expectProven(matrix, leftKernel(matrix));
        expect(certifiedRank(matrix)).toBe(rankOf(matrixOfRows(dense(matrix), matrix.columnCount)));
      }),
      { seed: 20261201, numRuns: 300 },
    );
  });

  test('agrees where one connected part needs a dense core', () => {
    const matrices = fc
      .integer({ min: 80, max: 120 })
      .chain((rows) => columnsOf(rows, { min: 70, max: 110 }, 2).map((columns) => sparse(rows, columns)));
    fc.assert(
      fc.property(matrices, (matrix) => expectProven(matrix, leftKernel(matrix))),
      { seed: 20261201, numRuns: 15 },
    );
  });

  test('lifts entries that no single prime can hold', () => {
    const big = 999_983;
    const columns = [
      [
        [0, big],
        [1, -1],
        [2, 1],
      ],
      [
        [1, big],
        [2, -1],
        [3, 7],
      ],
      [
        [2, big],
        [3, -1],
        [0, 5],
      ],
    ] as const;
    const matrix = sparse(4, columns);
    expectProven(matrix, leftKernel(matrix));
  });

  test('follows chains whose laws have thousands of digits', () => {
    const length = 2000;
    const columns = Array.from({ length }, (_, i) => [[i, -2] as const, [i + 1, 3] as const]);
    const kernel = leftKernel(sparse(length + 1, columns));
    expect(kernel?.rank).toBe(length);
    expect(kernel?.basis[0]?.values[0]).toBe(3n ** BigInt(length));
    expect(kernel?.basis[0]?.values[length]).toBe(2n ** BigInt(length));
  });

  test('is not misled by primes that divide everything in sight', () => {
    // The largest primes below 2^22, the field's own, and Mersenne's 2^31 - 1: A -> (p + 1) A has rank 1.
    for (const p of [4194301, 4194287, 4194277, 4194301 * 4194287, 2147483647]) {
      expect(leftKernel(sparse(1, [[[0, p]]]))).toEqual({ rank: 1, basis: [], complete: true });
      const wide = sparse(3, [
        [
          [0, p],
          [1, p],
          [2, p],
        ],
        [
          [0, 1],
          [1, 1],
          [2, 1 + p],
        ],
      ]);
      expectProven(wide, leftKernel(wide));
      expect(certifiedRank(wide)).toBe(2);
    }
    const primes = primesBelow(4194304, 40);
    const columns = primes.map((p, i) => [[i, p] as const, [i + 1, 1] as const, [(i + 7) % 41, 1] as const]);
    const matrix = sparse(
      41,
      columns.map((column) => [...new Map(column)]),
    );
    expectProven(matrix, leftKernel(matrix));
  });

  test('has defined answers without rows, columns or entries', () => {
    expect(leftKernel(sparse(0, []))).toEqual({ rank: 0, basis: [], complete: true });
    expectProven(sparse(3, []), leftKernel(sparse(3, [])));
    expectProven(sparse(2, [[], []]), leftKernel(sparse(2, [[], []])));
  });
});

function primesBelow(limit: number, count: number): number[] {
  const found: number[] = [];
  for (let n = limit - 1; found.length < count; n--) {
    let divisor = 2;
    while (divisor * divisor <= n && n % divisor !== 0) divisor++;
    if (divisor * divisor > n) found.push(n);
  }
  return found;
}
