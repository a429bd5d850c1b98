import type { RowIndex, SparseColumns, SparseVector } from './sparse.ts';
import { rowIndex } from './sparse.ts';

/** Sums whose terms add up to less than this in absolute value are exact in doubles. */
const EXACT = 2 ** 52;

/**
 * Decides exactly, for one matrix and many sparse integer vectors w, whether w · matrix = 0. Costs the entries of the
 * rows in the support of w only.
 */
export class AnnihilationCheck {
  readonly #matrix: SparseColumns;
  readonly #byRow: RowIndex;
  readonly #sums: Float64Array;
  readonly #largestColumn: number;

  constructor(matrix: SparseColumns) {
    this.#matrix = matrix;
    this.#byRow = rowIndex(matrix);
    this.#sums = new Float64Array(matrix.columnCount);
    this.#largestColumn = largestColumnSum(matrix);
  }

  /** Whether the vector annihilates every column; no rounding whatever the size of its entries. */
  holds(vector: SparseVector): boolean {
    let largest = 0;
    for (const value of vector.values) largest = Math.max(largest, Math.abs(Number(value)));
    return largest * this.#largestColumn < EXACT ? this.#holdsShort(vector) : this.#holdsLong(vector);
  }

  #holdsShort(vector: SparseVector): boolean {
    const sums = this.#sums;
    this.#forEachTerm(vector, (column, entry, i) => (sums[column]! += entry * Number(vector.values[i])));
    let zero = true;
    this.#forEachTerm(vector, (column) => {
      if (sums[column] !== 0) zero = false;
      sums[column] = 0;
    });
    return zero;
  }

  #holdsLong(vector: SparseVector): boolean {
    const sums = new Map<number, bigint>();
    this.#forEachTerm(vector, (column, entry, i) => {
      sums.set(column, (sums.get(column) ?? 0n) + BigInt(entry) * vector.values[i]!);
    });
    return [...sums.values()].every((sum) => sum === 0n);
  }

  #forEachTerm(vector: SparseVector, visit: (column: number, entry: number, i: number) => void): void {
    const { offsets, columns, positions } = this.#byRow;
    for (let i = 0; i < vector.indices.length; i++) {
      const row = vector.indices[i]!;
      for (let k = offsets[row]!; k < offsets[row + 1]!; k++) {
        visit(columns[k]!, this.#matrix.values[positions[k]!]!, i);
      }
    }
  }
}

function largestColumnSum(matrix: SparseColumns): number {
  let largest = 0;
  for (let column = 0; column < matrix.columnCount; column++) {
    let sum = 0;
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      sum += Math.abs(matrix.values[k]!);
    }
    if (sum > largest) largest = sum;
  }
  return largest;
}
