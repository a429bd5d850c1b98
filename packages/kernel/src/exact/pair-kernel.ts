import { absolute, gcd, lcm } from './integers.ts';
import { rowIndex } from './sparse.ts';
import type { LeftKernel, RowIndex, SparseColumns, SparseVector } from './sparse.ts';

/**
 * Rank and left kernel of a matrix whose columns have at most two entries, exactly and in linear time. A column a·e_i +
 * b·e_j fixes the ratio of w_i and w_j, so a connected set of rows carries one kernel vector, found along a spanning
 * tree, if every other column agrees with it, and none otherwise. The tree columns form a triangular minor, which proves
 * the rank; no prime is involved.
 */
export function pairLeftKernel(matrix: SparseColumns): LeftKernel {
  const walk = new RatioWalk(matrix);
  const basis: SparseVector[] = [];
  for (let row = 0; row < matrix.rowCount; row++) {
    const vector = walk.from(row);
    if (vector !== null) basis.push(vector);
  }
  return { rank: matrix.rowCount - basis.length, basis, complete: true };
}

class RatioWalk {
  readonly #matrix: SparseColumns;
  readonly #byRow: RowIndex;
  readonly #seen: Uint8Array;
  readonly #queue: Int32Array;
  /** w of each seen row as a fraction; shared references where the ratio is 1, so lattices cost no arithmetic. */
  readonly #numerators: bigint[];
  readonly #denominators: bigint[];

  constructor(matrix: SparseColumns) {
    this.#matrix = matrix;
    this.#byRow = rowIndex(matrix);
    this.#seen = new Uint8Array(matrix.rowCount);
    this.#queue = new Int32Array(matrix.rowCount);
    this.#numerators = new Array<bigint>(matrix.rowCount).fill(0n);
    this.#denominators = new Array<bigint>(matrix.rowCount).fill(1n);
  }

  /** The kernel vector of the component that begins at an unseen row; null where there is none or the row was seen. */
  from(root: number): SparseVector | null {
    if (this.#seen[root] === 1) return null;
    const { offsets, columns, positions } = this.#byRow;
    const queue = this.#queue;
    this.#seen[root] = 1;
    this.#numerators[root] = 1n;
    queue[0] = root;
    let end = 1;
    let consistent = true;
    for (let at = 0; at < end; at++) {
      const row = queue[at]!;
      for (let k = offsets[row]!; k < offsets[row + 1]!; k++) {
        const other = this.#partner(columns[k]!, positions[k]!);
        if (other < 0) {
          consistent = false;
          continue;
        }
        const target = this.#matrix.rows[other]!;
        const own = this.#matrix.values[positions[k]!]!;
        const its = this.#matrix.values[other]!;
        if (this.#seen[target] === 0) {
          this.#seen[target] = 1;
          queue[end++] = target;
          if (consistent) this.#follow(row, own, target, its);
        } else if (consistent && !this.#agrees(row, own, target, its)) {
          consistent = false;
        }
      }
    }
    return consistent ? this.#vector(this.#ascending(end)) : null;
  }

  /** The rows of the queue in order. */
  #ascending(end: number): Int32Array {
    const whole = end === this.#matrix.rowCount;
    return whole ? Int32Array.from({ length: end }, (_, row) => row) : this.#queue.slice(0, end).sort();
  }

  /** Position of the other entry of a column, or -1. */
  #partner(column: number, position: number): number {
    const start = this.#matrix.offsets[column]!;
    if (this.#matrix.offsets[column + 1]! - start < 2) return -1;
    return position === start ? start + 1 : start;
  }

  /** Sets w_target = −own·w_row / its. */
  #follow(row: number, own: number, target: number, its: number): void {
    let numerator = this.#numerators[row]!;
    let denominator = this.#denominators[row]!;
    if (own !== -its) {
      numerator *= BigInt(-own);
      denominator *= BigInt(its);
      const common = gcd(numerator, denominator) * (denominator < 0n ? -1n : 1n);
      numerator /= common;
      denominator /= common;
    }
    this.#numerators[target] = numerator;
    this.#denominators[target] = denominator;
  }

  #agrees(row: number, own: number, target: number, its: number): boolean {
    const opposite = own === -its;
    if (
      opposite &&
      this.#numerators[row] === this.#numerators[target] &&
      this.#denominators[row] === this.#denominators[target]
    ) {
      return true;
    }
    const left = this.#numerators[row]! * this.#denominators[target]!;
    const right = this.#numerators[target]! * this.#denominators[row]!;
    return opposite ? left === right : BigInt(own) * left + BigInt(its) * right === 0n;
  }

  #vector(rows: Int32Array): SparseVector {
    let scale = 1n;
    for (const row of rows) {
      const denominator = this.#denominators[row]!;
      if (denominator !== 1n && scale % denominator !== 0n) scale = lcm(scale, denominator);
    }
    let common = 0n;
    for (let i = 0; i < rows.length && common !== 1n; i++) {
      common = gcd(common, absolute(this.#numerators[rows[i]!]!) * (scale / this.#denominators[rows[i]!]!));
    }
    const positive = this.#numerators[rows[0]!]! > 0n ? 1n : -1n;
    const values = new Array<bigint>(rows.length);
    for (let i = 0; i < rows.length; i++) {
      const numerator = this.#numerators[rows[i]!]!;
      values[i] =
        scale === 1n && common === 1n && positive === 1n
          ? numerator
          : (positive * numerator * (scale / this.#denominators[rows[i]!]!)) / common;
    }
    return { indices: rows, values };
  }
}
