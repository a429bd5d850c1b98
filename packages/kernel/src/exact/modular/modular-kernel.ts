import { DenseCore } from './dense-core.ts';
import type { EliminationOrder } from './elimination-order.ts';
import { eliminationOrder } from './elimination-order.ts';
import type { PrimeField } from './field.ts';
import { inverseResidue, multiplyResidues, reduce } from './field.ts';
import { LinearForms } from './linear-forms.ts';
import type { ModularColumns } from './modular-columns.ts';

/** Largest dense core that is worked on: about 2·10^10 multiplications and 130 MB. */
const DENSE_LIMIT = 4000;
/** Cores up to this size are always dense. */
const SMALL_CORE = 64;
/** Dependent vectors in a row after which the rest is tested at once. */
const PATIENCE = 30;

/**
 * Rank and left kernel modulo p. The minor of `pivotRows` and `pivotColumns` is not zero modulo p, so the rank over the
 * rationals is at least `rank`. `forms` gives w for every row as a form in the parameters (the rows `parameters`, one
 * kernel vector each); that all of them annihilate the matrix is exact modulo p up to the test of `restrict`, which may
 * overlook a column with probability 1/p: callers verify over the integers.
 */
export interface ModularKernel {
  readonly rank: number;
  readonly pivotRows: Int32Array;
  readonly pivotColumns: Int32Array;
  readonly parameters: Int32Array;
  readonly forms: LinearForms;
}

/**
 * Computes the left kernel of a sparse matrix modulo p; null where the dense core would be too large. `checkpoint` is
 * called before each vector of the dense core.
 */
export function modularLeftKernel(
  matrix: ModularColumns,
  field: PrimeField,
  checkpoint: () => void = () => undefined,
): ModularKernel | null {
  const order = eliminationOrder(matrix);
  checkpoint();
  const core = coreKernel(matrix, order, field, checkpoint);
  if (core === null) return null;
  const width = core.parameters.length + order.free.length;
  const forms = new LinearForms(matrix.rowCount, width, field);
  core.assign(forms);
  order.free.forEach((row, j) => forms.setParameter(row, core.parameters.length + j));
  order.resolvedRows.forEach((row, k) => forms.resolve(matrix, row, order.resolvedColumns[k]!));
  for (let k = order.peeledRows.length - 1; k >= 0; k--) {
    forms.resolve(matrix, order.peeledRows[k]!, order.peeledColumns[k]!);
  }
  return {
    rank: matrix.rowCount - width,
    pivotRows: join(order.peeledRows, order.resolvedRows, core.pivotRows),
    pivotColumns: join(order.peeledColumns, order.resolvedColumns, core.pivotColumns),
    parameters: join(core.parameters, order.free),
    forms,
  };
}

/** What restricts the core rows, and the kernel that is left on them, in rows and columns of the matrix. */
interface CoreKernel {
  readonly parameters: Int32Array;
  readonly pivotRows: Int32Array;
  readonly pivotColumns: Int32Array;
  /** Sets the forms of the core rows in a store whose first parameters are those of the core. */
  assign(forms: LinearForms): void;
}

function coreKernel(
  matrix: ModularColumns,
  order: EliminationOrder,
  field: PrimeField,
  checkpoint: () => void,
): CoreKernel | null {
  const { core, unused } = order;
  const none = new Int32Array(0);
  if (unused.length === 0) {
    return {
      parameters: core,
      pivotRows: none,
      pivotColumns: none,
      assign: (forms) => core.forEach((row, j) => forms.setParameter(row, j)),
    };
  }
  const overCore = new LinearForms(matrix.rowCount, core.length, field);
  core.forEach((row, j) => overCore.setParameter(row, j));
  order.resolvedRows.forEach((row, k) => overCore.resolve(matrix, row, order.resolvedColumns[k]!));
  const undetermined = core.length + order.resolvedRows.length;
  const sparse = core.length > SMALL_CORE && core.length < 0.8 * undetermined && overCore.density < 0.1;
  if (sparse) return sparseCore(matrix, order, overCore, field, checkpoint);
  if (core.length > DENSE_LIMIT) return null;
  return denseCore(matrix, order, overCore, field, checkpoint);
}

/** The restrictions are a smaller sparse matrix: treat it in the same way. */
function sparseCore(
  matrix: ModularColumns,
  order: EliminationOrder,
  overCore: LinearForms,
  field: PrimeField,
  checkpoint: () => void,
): CoreKernel | null {
  const { core, unused } = order;
  const inner = modularLeftKernel(restrictions(matrix, unused, overCore), field, checkpoint);
  if (inner === null) return null;
  return {
    parameters: inner.parameters.map((j) => core[j]!),
    pivotRows: inner.pivotRows.map((j) => core[j]!),
    pivotColumns: inner.pivotColumns.map((j) => unused[j]!),
    assign: (forms) => core.forEach((row, j) => forms.copyFrom(inner.forms, j, row)),
  };
}

function restrictions(matrix: ModularColumns, columns: Int32Array, overCore: LinearForms): ModularColumns {
  const parts = Array.from(columns, (column) => overCore.restriction(matrix, column));
  const offsets = new Int32Array(parts.length + 1);
  parts.forEach((part, j) => (offsets[j + 1] = offsets[j]! + part.indices.length));
  const rows = new Int32Array(offsets[parts.length]!);
  const values = new Int32Array(rows.length);
  parts.forEach((part, j) => {
    rows.set(part.indices, offsets[j]!);
    values.set(part.values, offsets[j]!);
  });
  return { rowCount: overCore.width, columnCount: parts.length, offsets, rows, values };
}

/** The restrictions one by one, dense; most of them depend on earlier ones and are tested together. */
function denseCore(
  matrix: ModularColumns,
  order: EliminationOrder,
  overCore: LinearForms,
  field: PrimeField,
  checkpoint: () => void,
): CoreKernel {
  const { core, unused } = order;
  const space = new DenseCore(core.length, field);
  const vector = new Float64Array(core.length);
  const add = (column: number) => {
    checkpoint();
    overCore.restrictionInto(vector, matrix, column);
    return space.add(vector, column);
  };
  let dependent = 0;
  let next = 0;
  while (next < unused.length && space.rank < core.length && dependent < PATIENCE) {
    dependent = add(unused[next++]!) ? 0 : dependent + 1;
  }
  let open = unused.subarray(next);
  while (open.length > 0 && space.rank < core.length) {
    open = columnsNotAnnihilated(matrix, order, randomKernelVector(space, field), open, field);
    open.forEach(add);
  }
  const free = space.freeParameters;
  return {
    parameters: free.map((j) => core[j]!),
    pivotRows: space.pivotParameters.map((j) => core[j]!),
    pivotColumns: Int32Array.from(space.pivotLabels),
    assign: (forms) => assignOrthogonal(space, core, forms),
  };
}

/** Each core row as a form in the kernel vectors of the dense core. */
function assignOrthogonal(space: DenseCore, core: Int32Array, forms: LinearForms): void {
  const size = space.width - space.rank;
  const unit = new Float64Array(size);
  const vectors = Array.from({ length: size }, (_, j) => {
    unit.fill(0);
    unit[j] = 1;
    return space.orthogonal(unit);
  });
  core.forEach((row, parameter) => {
    forms.setForm(
      row,
      vectors.map((vector) => vector[parameter]!),
    );
  });
}

/** A kernel vector of the core with scrambled residues: one that any given column fails to annihilate by luck is rare. */
function randomKernelVector(space: DenseCore, field: PrimeField): Float64Array {
  const free = new Float64Array(space.width - space.rank);
  let state = 20261201 + space.rank;
  for (let j = 0; j < free.length; j++) {
    // The multiplier of Lehmer's generator; products stay below 2^53.
    state = (state * 48271) % 2147483647;
    free[j] = state % field.p;
  }
  return space.orthogonal(free);
}

function columnsNotAnnihilated(
  matrix: ModularColumns,
  order: EliminationOrder,
  onCore: Float64Array,
  columns: Int32Array,
  field: PrimeField,
): Int32Array {
  const { p, reciprocal } = field;
  const w = new Float64Array(matrix.rowCount);
  order.core.forEach((row, j) => (w[row] = onCore[j]!));
  const evaluate = (column: number) => {
    let sum = 0;
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      sum = reduce(sum + w[matrix.rows[k]!]! * matrix.values[k]!, p, reciprocal);
    }
    return sum;
  };
  order.resolvedRows.forEach((row, i) => {
    const column = order.resolvedColumns[i]!;
    const sum = evaluate(column);
    if (sum === 0) return;
    w[row] = multiplyResidues(sum, p - inverseResidue(entryAt(matrix, row, column), p), p, reciprocal);
  });
  return columns.filter((column) => evaluate(column) !== 0);
}

function entryAt(matrix: ModularColumns, row: number, column: number): number {
  let k = matrix.offsets[column]!;
  while (matrix.rows[k] !== row) k++;
  return matrix.values[k]!;
}

function join(...parts: readonly Int32Array[]): Int32Array {
  const joined = new Int32Array(parts.reduce((sum, part) => sum + part.length, 0));
  let end = 0;
  for (const part of parts) {
    joined.set(part, end);
    end += part.length;
  }
  return joined;
}
