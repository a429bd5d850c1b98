import type { PrimeField } from './field.ts';
import { PRODUCTS_BEFORE_REDUCTION, inverseResidue, multiplyResidues, reduce } from './field.ts';
import type { ModularColumns } from './modular-columns.ts';

/** Forms with more than this share of non-zero coefficients are stored dense. */
const DENSE_SHARE = 0.25;
const NONE = -1;
const DENSE = -2;

/**
 * A linear form over Z/p in `width` parameters for each row of a matrix, filled in one by one: w_row = Σ form · parameter.
 * Forms are stored sparse or dense, whichever is smaller. One form at a time is built in a workspace.
 */
export class LinearForms {
  readonly width: number;
  readonly #field: PrimeField;
  /** NONE, DENSE, or the number of entries of a sparse form. */
  readonly #length: Int32Array;
  readonly #start: Float64Array;
  #indices = new Int32Array(1024);
  #values = new Int32Array(1024);
  #sparseEnd = 0;
  #dense: Int32Array[] = [];
  #stored = 0;
  #forms = 0;
  readonly #sum: Float64Array;
  readonly #stamp: Int32Array;
  readonly #touched: Int32Array;
  #touchedCount = 0;
  #allTouched = false;
  #round = 0;
  #products = 0;

  constructor(rowCount: number, width: number, field: PrimeField) {
    this.width = width;
    this.#field = field;
    this.#length = new Int32Array(rowCount).fill(NONE);
    this.#start = new Float64Array(rowCount);
    this.#sum = new Float64Array(width);
    this.#stamp = new Int32Array(width);
    this.#touched = new Int32Array(width);
  }

  /** Mean share of parameters that a stored form depends on. */
  get density(): number {
    return this.#forms === 0 || this.width === 0 ? 0 : this.#stored / (this.#forms * this.width);
  }

  /** Declares a row to be a parameter itself. */
  setParameter(row: number, parameter: number): void {
    this.#begin();
    this.#touch(parameter);
    this.#sum[parameter] = 1;
    this.#store(row, 1);
  }

  /** Sets a form by all its coefficients. */
  setForm(row: number, coefficients: readonly number[]): void {
    this.#begin();
    coefficients.forEach((residue, parameter) => {
      if (residue === 0) return;
      this.#touch(parameter);
      this.#sum[parameter] = residue;
    });
    this.#store(row, 1);
  }

  /** Copies a form from another store, whose parameters are the first ones of this store. */
  copyFrom(other: LinearForms, otherRow: number, row: number): void {
    this.#begin();
    this.#addForm(other, otherRow, 1);
    this.#store(row, 1);
  }

  /** Determines `row` from the equation of a column whose other rows have forms. */
  resolve(matrix: ModularColumns, row: number, column: number): void {
    const pivot = this.#accumulate(matrix, column, row);
    const { p } = this.#field;
    this.#store(row, p - inverseResidue(pivot, p));
  }

  /** Σ entries · forms of a column, sparse: the restriction it puts on the parameters. */
  restriction(matrix: ModularColumns, column: number): { indices: Int32Array; values: Int32Array } {
    this.#accumulate(matrix, column, NONE);
    const start = this.#sparseEnd;
    const length = this.#writeSparse(1);
    return {
      indices: this.#indices.slice(start, start + length),
      values: this.#values.slice(start, start + length),
    };
  }

  /** The same restriction as a dense vector of residues. */
  restrictionInto(target: Float64Array, matrix: ModularColumns, column: number): void {
    this.#accumulate(matrix, column, NONE);
    this.#reduceSum();
    target.set(this.#sum);
  }

  /** Calls `visit` for every non-zero coefficient of a row's form. */
  forEach(row: number, visit: (parameter: number, residue: number) => void): void {
    const length = this.#length[row]!;
    if (length === DENSE) {
      const form = this.#dense[this.#start[row]!]!;
      for (let q = 0; q < this.width; q++) if (form[q] !== 0) visit(q, form[q]!);
      return;
    }
    const start = this.#start[row]!;
    for (let k = start; k < start + length; k++) visit(this.#indices[k]!, this.#values[k]!);
  }

  #begin(): void {
    this.#round++;
    this.#touchedCount = 0;
    this.#allTouched = false;
    this.#products = 0;
  }

  #touch(parameter: number): void {
    if (this.#stamp[parameter] === this.#round) return;
    this.#stamp[parameter] = this.#round;
    this.#sum[parameter] = 0;
    this.#touched[this.#touchedCount++] = parameter;
  }

  #touchAll(): void {
    if (this.#allTouched) return;
    for (let q = 0; q < this.width; q++) if (this.#stamp[q] !== this.#round) this.#sum[q] = 0;
    this.#stamp.fill(this.#round);
    this.#allTouched = true;
  }

  /** Adds all rows of a column but `skip` into the workspace; returns the entry of `skip`. */
  #accumulate(matrix: ModularColumns, column: number, skip: number): number {
    this.#begin();
    let skipped = 0;
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      const row = matrix.rows[k]!;
      if (row === skip) skipped = matrix.values[k]!;
      else this.#addForm(this, row, matrix.values[k]!);
    }
    return skipped;
  }

  #addForm(source: LinearForms, row: number, factor: number): void {
    if (++this.#products > PRODUCTS_BEFORE_REDUCTION) this.#reduceSum();
    const length = source.#length[row]!;
    const sum = this.#sum;
    if (length === DENSE) {
      this.#touchAll();
      const form = source.#dense[source.#start[row]!]!;
      for (let q = 0; q < form.length; q++) sum[q]! += factor * form[q]!;
      return;
    }
    const start = source.#start[row]!;
    for (let k = start; k < start + length; k++) {
      const q = source.#indices[k]!;
      if (!this.#allTouched) this.#touch(q);
      sum[q]! += factor * source.#values[k]!;
    }
  }

  /** Brings the workspace back to residues; afterwards every entry of it is valid. */
  #reduceSum(): void {
    const { p, reciprocal } = this.#field;
    this.#touchAll();
    for (let q = 0; q < this.width; q++) this.#sum[q] = reduce(this.#sum[q]!, p, reciprocal);
    this.#products = 1;
  }

  #store(row: number, factor: number): void {
    this.#forms++;
    if (this.#allTouched || (this.width > 16 && this.#touchedCount > DENSE_SHARE * this.width)) {
      this.#storeDense(row, factor);
      return;
    }
    this.#start[row] = this.#sparseEnd;
    const length = this.#writeSparse(factor);
    this.#length[row] = length;
    this.#sparseEnd += length;
    this.#stored += length;
  }

  #storeDense(row: number, factor: number): void {
    const { p, reciprocal } = this.#field;
    this.#reduceSum();
    const form = new Int32Array(this.width);
    let filled = 0;
    for (let q = 0; q < form.length; q++) {
      form[q] = factor === 1 ? this.#sum[q]! : multiplyResidues(this.#sum[q]!, factor, p, reciprocal);
      if (form[q] !== 0) filled++;
    }
    this.#stored += filled;
    if (filled <= DENSE_SHARE * this.width) {
      this.#start[row] = this.#sparseEnd;
      this.#length[row] = filled;
      this.#reserve(filled);
      for (let q = 0; q < form.length; q++) {
        if (form[q] === 0) continue;
        this.#indices[this.#sparseEnd] = q;
        this.#values[this.#sparseEnd++] = form[q]!;
      }
      return;
    }
    this.#start[row] = this.#dense.length;
    this.#length[row] = DENSE;
    this.#dense.push(form);
  }

  /** Writes the non-zero entries of the workspace times `factor` at the end of the sparse pool, without claiming them. */
  #writeSparse(factor: number): number {
    const { p, reciprocal } = this.#field;
    const count = this.#allTouched ? this.width : this.#touchedCount;
    this.#reserve(count);
    let length = 0;
    for (let k = 0; k < count; k++) {
      const q = this.#allTouched ? k : this.#touched[k]!;
      const residue = reduce(this.#sum[q]!, p, reciprocal);
      if (residue === 0) continue;
      this.#indices[this.#sparseEnd + length] = q;
      this.#values[this.#sparseEnd + length++] = multiplyResidues(residue, factor, p, reciprocal);
    }
    return length;
  }

  #reserve(more: number): void {
    const needed = this.#sparseEnd + more;
    if (needed <= this.#indices.length) return;
    const capacity = Math.max(needed, 2 * this.#indices.length);
    const grow = (pool: Int32Array) => {
      const larger = new Int32Array(capacity);
      larger.set(pool.subarray(0, this.#sparseEnd));
      return larger;
    };
    this.#indices = grow(this.#indices);
    this.#values = grow(this.#values);
  }
}
