import { AnnihilationCheck } from './annihilates.ts';
import { connectedBlocks, onlyPairs } from './blocks.ts';
import { leftNullspace } from './nullspace.ts';
import { primitiveWithPositiveLead } from './integers.ts';
import { matrixFrom } from './matrix.ts';
import { primeField } from './modular/field.ts';
import { ModularLift } from './modular/modular-lift.ts';
import { modularColumns } from './modular/modular-columns.ts';
import { modularLeftKernel } from './modular/modular-kernel.ts';
import { pairLeftKernel } from './pair-kernel.ts';
import type { LeftKernel, SparseColumns, SparseVector } from './sparse.ts';

export type { LeftKernel } from './sparse.ts';

/** Primes tried for one block before exact elimination, or giving up, takes over. */
const PRIMES = 64;
/** Blocks up to this many entries (rows × columns) may be eliminated exactly. */
const EXACT_ENTRIES = 250_000;

/**
 * Certified rank and left kernel of a sparse integer matrix, block by block (blocks: connected components of the
 * bipartite graph of rows and columns). Blocks whose columns have at most two entries are solved exactly along a forest;
 * others modulo primes below 2^22, lifted and verified over the integers (after Dumas, Saunders, Villard 2001). Null where
 * a block is too large to be decided. Deterministic. `checkpoint` is called often and may throw to end the work.
 */
export function leftKernel(
  matrix: SparseColumns,
  checkpoint: () => void = () => undefined,
): LeftKernel | null {
  if (onlyPairs(matrix)) return pairLeftKernel(matrix);
  let rank = 0;
  let complete = true;
  const basis: SparseVector[] = [];
  for (const block of connectedBlocks(matrix)) {
    const local = onlyPairs(block.matrix)
      ? pairLeftKernel(block.matrix)
      : blockLeftKernel(block.matrix, checkpoint);
    if (local === null) return null;
    rank += local.rank;
    complete &&= local.complete;
    for (const vector of local.basis) {
      basis.push({ indices: vector.indices.map((row) => block.rows[row]!), values: vector.values });
    }
  }
  basis.sort((a, b) => a.indices[0]! - b.indices[0]!);
  return { rank, basis, complete };
}

/** Certified rank alone: cheaper where the rank is as large as the matrix allows. Null where undecided. */
export function certifiedRank(matrix: SparseColumns): number | null {
  const field = primeField(0);
  const kernel = modularLeftKernel(modularColumns(matrix, field.p), field);
  if (kernel !== null && kernel.rank === Math.min(matrix.rowCount, matrix.columnCount)) return kernel.rank;
  return leftKernel(matrix)?.rank ?? null;
}

/**
 * Ranks modulo a prime of the parts of a matrix in which columns of different parts share no row: lower bounds of the true
 * ranks. `part` gives the part of each column. Null where the dense core would be too large.
 */
export function modularRanks(matrix: SparseColumns, part: Int32Array, parts: number): Int32Array | null {
  const field = primeField(0);
  const kernel = modularLeftKernel(modularColumns(matrix, field.p), field);
  if (kernel === null) return null;
  const ranks = new Int32Array(parts);
  for (const column of kernel.pivotColumns) ranks[part[column]!]!++;
  return ranks;
}

function blockLeftKernel(matrix: SparseColumns, checkpoint: () => void): LeftKernel | null {
  const check = new AnnihilationCheck(matrix);
  const largest = Math.min(matrix.rowCount, matrix.columnCount);
  let lift: ModularLift | null = null;
  for (let attempt = 0; attempt < PRIMES; attempt++) {
    const field = primeField(attempt);
    const kernel = modularLeftKernel(modularColumns(matrix, field.p), field, checkpoint);
    if (kernel === null) return null;
    if (lift === null || kernel.rank > lift.rank) lift = new ModularLift(kernel, check);
    if (lift.include(kernel, field)) return { rank: lift.rank, basis: lift.proven(), complete: true };
  }
  if (matrix.rowCount * matrix.columnCount <= EXACT_ENTRIES) return exactLeftKernel(matrix);
  return lift !== null && lift.rank === largest
    ? { rank: largest, basis: lift.proven(), complete: false }
    : null;
}

/** Fraction-free elimination: for small blocks that defeat every prime tried. */
function exactLeftKernel(matrix: SparseColumns): LeftKernel {
  const dense = Array.from({ length: matrix.rowCount }, () => new Map<number, number>());
  for (let column = 0; column < matrix.columnCount; column++) {
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      dense[matrix.rows[k]!]!.set(column, matrix.values[k]!);
    }
  }
  const vectors = leftNullspace(
    matrixFrom(matrix.rowCount, matrix.columnCount, (row, column) => BigInt(dense[row]!.get(column) ?? 0)),
  );
  const basis = vectors.map((vector) => {
    const entries = primitiveWithPositiveLead(vector);
    const indices = Int32Array.from(entries.keys()).filter((row) => entries[row] !== 0n);
    return { indices, values: Array.from(indices, (row) => entries[row]!) };
  });
  return { rank: matrix.rowCount - basis.length, basis, complete: true };
}
