import type { Rational } from '@stillroom/shared/network';
import { lcm } from './integers.ts';
import { ZERO } from './rational.ts';

/** A dense matrix by rows. Sizes are kept apart from the entries so that matrices without rows keep their width. */
export interface Matrix<T> {
  readonly rows: number;
  readonly columns: number;
  readonly entries: readonly (readonly T[])[];
}

export type IntegerMatrix = Matrix<bigint>;
export type RationalMatrix = Matrix<Rational>;

/** A matrix from its rows; `columns` is needed only where there may be no rows. */
export function matrixOfRows<T>(entries: readonly (readonly T[])[], columns?: number): Matrix<T> {
  const width = columns ?? entries[0]?.length ?? 0;
  if (entries.some((row) => row.length !== width)) {
    throw new RangeError(`Every row of this matrix needs ${width} entries.`);
  }
  return { rows: entries.length, columns: width, entries };
}

/** A matrix whose entry at (row, column) is given by a function. */
export function matrixFrom<T>(
  rows: number,
  columns: number,
  entry: (row: number, column: number) => T,
): Matrix<T> {
  const entries = Array.from({ length: rows }, (_, row) =>
    Array.from({ length: columns }, (_, column) => entry(row, column)),
  );
  return { rows, columns, entries };
}

/** The identity of the given size. */
export function identity(size: number): IntegerMatrix {
  return matrixFrom(size, size, (row, column) => (row === column ? 1n : 0n));
}

/** Rows and columns exchanged. */
export function transpose<T>(a: Matrix<T>): Matrix<T> {
  return matrixFrom(a.columns, a.rows, (row, column) => a.entries[column]![row]!);
}

/** The product a·b of integer matrices. */
export function product(a: IntegerMatrix, b: IntegerMatrix): IntegerMatrix {
  if (a.columns !== b.rows) throw new RangeError('Inner sizes of a matrix product must agree.');
  return matrixFrom(a.rows, b.columns, (row, column) => {
    let sum = 0n;
    const left = a.entries[row]!;
    for (let k = 0; k < a.columns; k++) {
      if (left[k] !== 0n) sum += left[k]! * b.entries[k]![column]!;
    }
    return sum;
  });
}

/** Σ a_i b_i. */
export function dot(a: readonly bigint[], b: readonly bigint[]): bigint {
  let sum = 0n;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

/**
 * Integers on the line of a rational vector: `integers` = `scale` · vector with the least positive integer scale.
 */
export function clearDenominators(vector: readonly Rational[]): { integers: bigint[]; scale: bigint } {
  const scale = vector.reduce((common, entry) => lcm(common, entry.denominator), 1n);
  return { integers: vector.map((entry) => (entry.numerator * scale) / entry.denominator), scale };
}

/** Each row times the least positive integer that makes it integral: same rank, same right kernel. */
export function integerRows(a: RationalMatrix): IntegerMatrix {
  return { ...a, entries: a.entries.map((row) => clearDenominators(row).integers) };
}

/** The same matrix over the rationals. */
export function rationalMatrix(a: IntegerMatrix): RationalMatrix {
  return {
    ...a,
    entries: a.entries.map((row) =>
      row.map((entry) => (entry === 0n ? ZERO : { numerator: entry, denominator: 1n })),
    ),
  };
}
