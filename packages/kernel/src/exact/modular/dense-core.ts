import type { PrimeField } from './field.ts';
import { PRODUCTS_BEFORE_REDUCTION, inverseResidue, multiplyResidues, reduce } from './field.ts';

/**
 * Row space over Z/p of dense vectors that come one at a time, as a unit upper triangular echelon form. Sums of
 * products are kept in doubles and reduced only before they could pass 2^53 (delayed reduction: Dumas, Gautier, Pernet
 * 2002).
 */
export class DenseCore {
  readonly width: number;
  readonly #field: PrimeField;
  /** Parameter at each position; pivots stand at positions 0 … rank − 1. */
  readonly #order: Int32Array;
  readonly #rows: Float64Array[] = [];
  readonly #work: Float64Array;
  readonly #labels: number[] = [];

  constructor(width: number, field: PrimeField) {
    this.width = width;
    this.#field = field;
    this.#order = Int32Array.from({ length: width }, (_, parameter) => parameter);
    this.#work = new Float64Array(width);
  }

  get rank(): number {
    return this.#rows.length;
  }

  /** Labels of the vectors that raised the rank. */
  get pivotLabels(): readonly number[] {
    return this.#labels;
  }

  /** Pivot parameters, in the order of `pivotLabels`. */
  get pivotParameters(): Int32Array {
    return this.#order.slice(0, this.rank);
  }

  /** Parameters without pivot, one kernel vector each. */
  get freeParameters(): Int32Array {
    return this.#order.slice(this.rank);
  }

  /** Adds a vector of residues; true when it is independent of those before. */
  add(vector: Float64Array, label: number): boolean {
    const { p, reciprocal } = this.#field;
    const work = this.#work;
    const width = this.width;
    const rank = this.#rows.length;
    for (let q = 0; q < width; q++) work[q] = vector[this.#order[q]!]!;
    let products = 0;
    for (let b = 0; b < rank; b++) {
      const lead = reduce(work[b]!, p, reciprocal);
      if (lead === 0) continue;
      const factor = p - lead;
      const row = this.#rows[b]!;
      for (let q = b; q < width; q++) work[q]! += factor * row[q]!;
      if (++products === PRODUCTS_BEFORE_REDUCTION) {
        products = 0;
        for (let q = b + 1; q < width; q++) work[q] = reduce(work[q]!, p, reciprocal);
      }
    }
    let pivot = -1;
    for (let q = rank; q < width; q++) {
      work[q] = reduce(work[q]!, p, reciprocal);
      if (pivot < 0 && work[q] !== 0) pivot = q;
    }
    if (pivot < 0) return false;
    this.#exchange(rank, pivot);
    const scale = inverseResidue(work[rank]!, p);
    const row = new Float64Array(width);
    for (let q = rank; q < width; q++) row[q] = multiplyResidues(work[q]!, scale, p, reciprocal);
    this.#rows.push(row);
    this.#labels.push(label);
    return true;
  }

  /**
   * The vector orthogonal to all rows that takes the given residues at the free parameters (in the order of
   * `freeParameters`); indexed by parameter.
   */
  orthogonal(free: ArrayLike<number>): Float64Array {
    const { p, reciprocal } = this.#field;
    const rank = this.rank;
    const at = new Float64Array(this.width);
    for (let q = rank; q < this.width; q++) at[q] = free[q - rank]!;
    for (let b = rank - 1; b >= 0; b--) {
      const row = this.#rows[b]!;
      let sum = 0;
      let products = 0;
      for (let q = b + 1; q < this.width; q++) {
        sum += row[q]! * at[q]!;
        if (++products === PRODUCTS_BEFORE_REDUCTION) {
          products = 0;
          sum = reduce(sum, p, reciprocal);
        }
      }
      const residue = reduce(sum, p, reciprocal);
      at[b] = residue === 0 ? 0 : p - residue;
    }
    const vector = new Float64Array(this.width);
    for (let q = 0; q < this.width; q++) vector[this.#order[q]!] = at[q]!;
    return vector;
  }

  #exchange(a: number, b: number): void {
    if (a === b) return;
    swap(this.#order, a, b);
    swap(this.#work, a, b);
    for (const row of this.#rows) swap(row, a, b);
  }
}

function swap(array: Float64Array | Int32Array, a: number, b: number): void {
  const kept = array[a]!;
  array[a] = array[b]!;
  array[b] = kept;
}
