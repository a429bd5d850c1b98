import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import type { IntegerMatrix } from '../../../packages/kernel/src/exact/index.ts';
import {
  content,
  determinant,
  dot,
  echelon,
  hermiteForm,
  integerKernel,
  leftNullspace,
  matrixOfRows,
  product,
  rankOf,
  rightNullspace,
  solve,
} from '../../../packages/kernel/src/exact/index.ts';

const run = { seed: 20261201, numRuns: 200 };

const matrices = fc
  .tuple(fc.integer({ min: 0, max: 6 }), fc.integer({ min: 1, max: 6 }))
  .chain(([rows, columns]) =>
    fc
      .array(fc.array(fc.bigInt({ min: -4n, max: 4n }), { minLength: columns, maxLength: columns }), {
        minLength: rows,
        maxLength: rows,
      })
      .map((entries) => matrixOfRows(entries, columns)),
  );

/** Determinant by expansion along the first row: slow, and nothing like elimination. */
function expanded(entries: readonly (readonly bigint[])[]): bigint {
  if (entries.length === 0) return 1n;
  return entries[0]!.reduce((sum, entry, column) => {
    const minor = entries.slice(1).map((row) => row.filter((_, k) => k !== column));
    return sum + (column % 2 === 0 ? entry : -entry) * expanded(minor);
  }, 0n);
}

function timesVector(matrix: IntegerMatrix, vector: readonly bigint[]): bigint[] {
  return matrix.entries.map((row) => dot(row, vector));
}

describe('echelon form', () => {
  test('its pivot minor is not zero and no larger minor through it is', () => {
    fc.assert(
      fc.property(matrices, (matrix) => {
        const form = echelon(matrix);
        const minor = (rows: readonly number[], columns: readonly number[]) =>
          expanded(rows.map((row) => columns.map((column) => matrix.entries[row]![column]!)));
        const chosen = minor(form.pivotRows, form.pivotColumns);
        expect(chosen === form.pivot || chosen === -form.pivot).toBe(true);
        expect(chosen).not.toBe(0n);
        for (let row = 0; row < matrix.rows; row++) {
          for (let column = 0; column < matrix.columns; column++) {
            if (form.pivotRows.includes(row) || form.pivotColumns.includes(column)) continue;
            expect(minor([...form.pivotRows, row], [...form.pivotColumns, column])).toBe(0n);
          }
        }
      }),
      run,
    );
  });

  test('determinants agree with expansion', () => {
    const square = fc.integer({ min: 0, max: 5 }).chain((size) =>
      fc.array(fc.array(fc.bigInt({ min: -9n, max: 9n }), { minLength: size, maxLength: size }), {
        minLength: size,
        maxLength: size,
      }),
    );
    fc.assert(
      fc.property(square, (entries) => {
        expect(determinant(matrixOfRows(entries, entries.length))).toBe(expanded(entries));
      }),
      run,
    );
  });

  test('entries of 10^6 and more lose nothing', () => {
    const big = 10n ** 30n;
    expect(
      rankOf(
        matrixOfRows([
          [big, 1n],
          [big * big, big],
        ]),
      ),
    ).toBe(1);
    expect(
      rankOf(
        matrixOfRows([
          [big, 1n],
          [big * big + 1n, big],
        ]),
      ),
    ).toBe(2);
  });
});

describe('null spaces', () => {
  test('vectors are primitive, annihilated, and as many as the rank leaves', () => {
    fc.assert(
      fc.property(matrices, (matrix) => {
        const right = rightNullspace(matrix);
        expect(right).toHaveLength(matrix.columns - rankOf(matrix));
        for (const vector of right) {
          expect(timesVector(matrix, vector).every((entry) => entry === 0n)).toBe(true);
          expect(content(vector)).toBe(1n);
        }
        const left = leftNullspace(matrix);
        expect(left).toHaveLength(matrix.rows - rankOf(matrix));
        expect(rankOf(matrixOfRows(left, matrix.rows))).toBe(left.length);
        for (const vector of left) {
          for (let column = 0; column < matrix.columns; column++) {
            expect(
              dot(
                vector,
                matrix.entries.map((row) => row[column]!),
              ),
            ).toBe(0n);
          }
        }
      }),
      run,
    );
  });

  test('a solvable system is solved, an unsolvable one is refused', () => {
    const matrix = matrixOfRows([
      [2n, 4n],
      [1n, 2n],
    ]);
    expect(solve(matrix, [3n, 1n])).toBeNull();
    const solution = solve(matrix, [6n, 3n]);
    expect(solution).toEqual([
      { numerator: 3n, denominator: 1n },
      { numerator: 0n, denominator: 1n },
    ]);
  });
});

describe('Hermite normal form', () => {
  test('is a unimodular transform with reduced rows', () => {
    fc.assert(
      fc.property(matrices, (matrix) => {
        const { form, transform, pivotColumns, rank } = hermiteForm(matrix);
        const unimodular = determinant(matrixOfRows(transform, matrix.rows));
        expect(unimodular === 1n || unimodular === -1n).toBe(true);
        expect(product(matrixOfRows(transform, matrix.rows), matrix).entries).toEqual(form);
        expect(rank).toBe(rankOf(matrix));
        pivotColumns.forEach((column, k) => {
          const pivot = form[k]![column]!;
          expect(pivot > 0n).toBe(true);
          form.forEach((row, i) => {
            if (i > k) expect(row[column]).toBe(0n);
            if (i < k) expect(row[column]! >= 0n && row[column]! < pivot).toBe(true);
          });
        });
      }),
      run,
    );
  });

  test('the integer kernel is a basis of the lattice, not only of the space', () => {
    // 2x + 3y + 5z = 0: the rational basis (-3,2,0), (-5,0,2) misses (1,1,-1).
    const matrix = matrixOfRows([[2n, 3n, 5n]]);
    const basis = integerKernel(matrix);
    const minors = [
      [0, 1],
      [0, 2],
      [1, 2],
    ].map((columns) => determinant(matrixOfRows(basis.map((row) => columns.map((c) => row[c]!)))));
    expect(content(minors)).toBe(1n);
    fc.assert(
      fc.property(matrices, (random) => {
        const kernel = integerKernel(random);
        expect(kernel).toHaveLength(random.columns - rankOf(random));
        for (const vector of kernel) {
          expect(timesVector(random, vector).every((entry) => entry === 0n)).toBe(true);
        }
        // A lattice is saturated exactly when its Hermite form has gcd of maximal minors 1, i.e. all pivots of the
        // column-wise form are 1.
        const { rank, form, pivotColumns } = hermiteForm(
          matrixOfRows(
            Array.from({ length: random.columns }, (_, i) => kernel.map((row) => row[i]!)),
            kernel.length,
          ),
        );
        expect(rank).toBe(kernel.length);
        pivotColumns.forEach((column, k) => expect(form[k]![column]).toBe(1n));
      }),
      run,
    );
  });
});
