import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import { determinant, matrixOfRows } from '@stillroom/kernel/exact';
import { DenseCore } from '../../../../packages/kernel/src/exact/modular/dense-core.ts';
import { inverseResidue, primeField } from '../../../../packages/kernel/src/exact/modular/field.ts';
import { liftLong, liftShort } from '../../../../packages/kernel/src/exact/modular/lift.ts';
import { modularLeftKernel } from '../../../../packages/kernel/src/exact/modular/modular-kernel.ts';

const seed = 20261201;
const field = primeField(0);
const { p } = field;

const isPrime = (n: number) => {
  for (let divisor = 2; divisor * divisor <= n; divisor++) if (n % divisor === 0) return false;
  return n > 1;
};

describe('prime fields', () => {
  test('are the largest primes below 2^22, in order', () => {
    const first = [0, 1, 2, 3].map((k) => primeField(k).p);
    const found: number[] = [];
    for (let n = 2 ** 22 - 1; found.length < 4; n--) if (isPrime(n)) found.push(n);
    expect(first).toEqual(found);
  });

  test('every residue but 0 has an inverse', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: p - 1 }), (a) => {
        expect((BigInt(a) * BigInt(inverseResidue(a, p))) % BigInt(p)).toBe(1n);
      }),
      { seed },
    );
  });
});

describe('the modular left kernel', () => {
  const matrices = fc.integer({ min: 2, max: 9 }).chain((rows) =>
    fc
      .array(
        fc.uniqueArray(fc.tuple(fc.nat(rows - 1), fc.integer({ min: 1, max: p - 1 })), {
          selector: ([row]) => row,
          minLength: 1,
          maxLength: 4,
        }),
        { maxLength: 12 },
      )
      .map((columns) => ({ rows, columns })),
  );

  test('names a minor that is not zero modulo p, and forms that annihilate every column', () => {
    fc.assert(
      fc.property(matrices, ({ rows, columns }) => {
        const offsets = new Int32Array(columns.length + 1);
        columns.forEach((column, j) => (offsets[j + 1] = offsets[j]! + column.length));
        const matrix = {
          rowCount: rows,
          columnCount: columns.length,
          offsets,
          rows: Int32Array.from(columns.flat(), ([row]) => row),
          values: Int32Array.from(columns.flat(), ([, value]) => value),
        };
        const kernel = modularLeftKernel(matrix, field)!;
        const entry = (row: number, column: number) =>
          BigInt(columns[column]!.find(([r]) => r === row)?.[1] ?? 0);
        expect(kernel.pivotRows).toHaveLength(kernel.rank);
        expect(kernel.pivotColumns).toHaveLength(kernel.rank);
        const minor = Array.from(kernel.pivotRows, (row) =>
          Array.from(kernel.pivotColumns, (column) => entry(row, column)),
        );
        expect(determinant(matrixOfRows(minor, kernel.rank)) % BigInt(p)).not.toBe(0n);
        const w = Array.from({ length: rows }, () => new Map<number, bigint>());
        w.forEach((form, row) => kernel.forms.forEach(row, (j, residue) => form.set(j, BigInt(residue))));
        kernel.parameters.forEach((row, j) => expect([...w[row]!]).toEqual([[j, 1n]]));
        columns.forEach((_, column) => {
          kernel.parameters.forEach((_row, j) => {
            const sum = w.reduce((total, form, row) => total + (form.get(j) ?? 0n) * entry(row, column), 0n);
            expect(sum % BigInt(p)).toBe(0n);
          });
        });
      }),
      { seed, numRuns: 300 },
    );
  });

  test('its dense core adds up thousands of products without rounding', () => {
    const size = 1200;
    const core = new DenseCore(size, field);
    const vector = new Float64Array(size);
    for (let i = 0; i < size - 1; i++) {
      // Rows e_i − e_{i+1} scaled by p − 1 and filled so that every elimination step multiplies large residues.
      vector.fill(0);
      vector[i] = p - 1;
      vector[i + 1] = 1;
      expect(core.add(vector, i)).toBe(true);
    }
    vector.fill(0);
    vector[0] = p - 1;
    vector[size - 1] = 1;
    expect(core.add(vector, size)).toBe(false);
    expect(core.rank).toBe(size - 1);
    expect(new Set(core.orthogonal([1]))).toEqual(new Set([1]));
  });
});

describe('lifting residues', () => {
  test('finds fractions whose integers stay below the root of p / 2', () => {
    const fractions = fc.array(fc.tuple(fc.integer({ min: -40, max: 40 }), fc.constantFrom(1, 2, 3, 5, 6)), {
      minLength: 1,
      maxLength: 8,
    });
    fc.assert(
      fc.property(fractions, (vector) => {
        const modulo = (value: bigint, m: bigint) => ((value % m) + m) % m;
        const residues = [[1, 1] as const, ...vector].map(([top, bottom]) =>
          Number(modulo(BigInt(top) * BigInt(inverseResidue(bottom, p)), BigInt(p))),
        );
        for (const lifted of [liftShort(residues, p)!, liftLong(residues.map(BigInt), BigInt(p))!]) {
          const scale = lifted[0]!;
          vector.forEach(([top, bottom], i) =>
            expect(lifted[i + 1]! * BigInt(bottom)).toBe(scale * BigInt(top)),
          );
        }
      }),
      { seed },
    );
  });
});
