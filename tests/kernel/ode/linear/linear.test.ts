import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { pivotingSolver } from '../../../../packages/kernel/src/ode/linear/pivoting.ts';
import { factorizeSymbolically } from '../../../../packages/kernel/src/ode/linear/symbolic.ts';
import { tableSolver } from '../../../../packages/kernel/src/ode/linear/table.ts';
import {
  factorLength,
  unrolledFactor,
  unrolledSolve,
} from '../../../../packages/kernel/src/ode/linear/unrolled.ts';
import type { SparsePattern } from '@stillroom/kernel/ode';
import { assemble } from '@stillroom/kernel/program';

interface Matrix {
  readonly pattern: SparsePattern;
  readonly entries: Float64Array;
}

function sparse(rows: readonly (readonly (number | null)[])[]): Matrix {
  const size = rows.length;
  const rowStart = new Int32Array(size + 1);
  const columns: number[] = [];
  const entries: number[] = [];
  rows.forEach((row, i) => {
    row.forEach((value, j) => {
      if (value === null) return;
      columns.push(j);
      entries.push(value);
    });
    rowStart[i + 1] = columns.length;
  });
  return {
    pattern: { size, rowStart, columns: Int32Array.from(columns) },
    entries: Float64Array.from(entries),
  };
}

/** The largest residual relative to the largest |shift − J| |x| + |b|: what elimination with pivots by size keeps small. */
function normwiseError(matrix: Matrix, shift: number, x: Float64Array, b: Float64Array): number {
  const { pattern, entries } = matrix;
  let residual = 0;
  let size = 0;
  for (let i = 0; i < pattern.size; i++) {
    let rest = shift * x[i]! - b[i]!;
    let parts = Math.abs(shift * x[i]!) + Math.abs(b[i]!);
    for (let e = pattern.rowStart[i]!; e < pattern.rowStart[i + 1]!; e++) {
      const part = entries[e]! * x[pattern.columns[e]!]!;
      rest -= part;
      parts += Math.abs(part);
    }
    residual = Math.max(residual, Math.abs(rest));
    size = Math.max(size, parts);
  }
  return size > 0 ? residual / size : 0;
}

function solveByTable(
  { pattern, entries }: Matrix,
  shift: number,
  b: Float64Array,
): { x: Float64Array; growth: number } {
  const solver = tableSolver(pattern, factorizeSymbolically(pattern));
  const x = new Float64Array(pattern.size);
  const growth = solver.factor(entries, shift);
  solver.solve(b, x);
  return { x, growth };
}

function solveUnrolled(
  { pattern, entries }: Matrix,
  shift: number,
  b: Float64Array,
): { x: Float64Array; growth: number } {
  const symbolic = factorizeSymbolically(pattern);
  const [matrixAt, factorsAt] = [20, 20 + entries.length];
  const none = factorsAt + factorLength(symbolic);
  const [right, out] = [none + pattern.size, none + 2 * pattern.size];
  const assembly = assemble(
    out + pattern.size,
    () =>
      new Map([
        ['factor', { kind: 'straight', tapes: [unrolledFactor(pattern, symbolic, 1, 2)] }],
        ['solve', { kind: 'straight', tapes: [unrolledSolve(symbolic, factorsAt, none)] }],
      ]),
  );
  const { memory } = assembly;
  memory[1] = shift;
  memory.set(entries, matrixAt);
  memory.set(b, right);
  assembly.routine('factor')(matrixAt, factorsAt);
  assembly.routine('solve')(right, out);
  return { x: memory.slice(out, out + pattern.size), growth: memory[2]! };
}

/** Jacobians as closed systems of first-order reactions have them: columns sum to 0, off-diagonal entries ≥ 0. */
const closedJacobian = fc
  .tuple(
    fc.integer({ min: 1, max: 12 }),
    fc.array(fc.tuple(fc.nat(), fc.nat(), fc.double({ min: 1e-6, max: 1e6, noNaN: true })), {
      maxLength: 40,
    }),
  )
  .map(([size, arrows]) => {
    const rows: (number | null)[][] = Array.from({ length: size }, () =>
      new Array<number | null>(size).fill(null),
    );
    for (const [a, b, rate] of arrows) {
      const [from, to] = [a % size, b % size];
      if (from === to) continue;
      rows[to]![from] = (rows[to]![from] ?? 0) + rate;
      rows[from]![from] = (rows[from]![from] ?? 0) - rate;
    }
    return sparse(rows);
  });

describe('shift · I − J', () => {
  test('is solved to round-off in a fixed order of pivots where J is that of a closed system', () => {
    fc.assert(
      fc.property(closedJacobian, fc.double({ min: 1e-6, max: 1e6, noNaN: true }), (matrix, shift) => {
        const b = Float64Array.from({ length: matrix.pattern.size }, (_, i) => Math.sin(i + 1));
        const byTable = solveByTable(matrix, shift, b);
        const unrolled = solveUnrolled(matrix, shift, b);
        expect(byTable.growth).toBeLessThanOrEqual(1);
        expect(unrolled.growth).toBe(byTable.growth);
        expect(normwiseError(matrix, shift, byTable.x, b)).toBeLessThan(1e-13);
        expect(normwiseError(matrix, shift, unrolled.x, b)).toBeLessThan(1e-13);
      }),
      { seed: 11, numRuns: 100 },
    );
  });

  test('is solved to round-off with pivots by size whatever its entries', () => {
    const entry = fc.oneof(
      { weight: 2, arbitrary: fc.constant(null) },
      fc.double({ min: -1e3, max: 1e3, noNaN: true }),
    );
    const square = fc
      .integer({ min: 1, max: 10 })
      .chain((size) =>
        fc.array(fc.array(entry, { minLength: size, maxLength: size }), { minLength: size, maxLength: size }),
      );
    fc.assert(
      fc.property(square, (rows) => {
        const matrix = sparse(rows);
        const solver = pivotingSolver(matrix.pattern, factorizeSymbolically(matrix.pattern).order);
        const b = Float64Array.from({ length: rows.length }, (_, i) => Math.cos(i));
        if (!solver.factor(matrix.entries, 0.37)) return;
        const x = b.slice();
        solver.solve(x);
        expect(normwiseError(matrix, 0.37, x, b)).toBeLessThan(1e-13);
      }),
      { seed: 12, numRuns: 300 },
    );
  });

  test('with a vanishing pivot: the fixed order reports it, pivots by size solve it', () => {
    const matrix = sparse([
      [1, -1],
      [-1, 1 - 1e-12],
    ]);
    const b = Float64Array.of(1, 2);
    expect(solveByTable(matrix, 1, b).growth).toBeGreaterThan(1e6);
    const solver = pivotingSolver(matrix.pattern, Int32Array.of(0, 1));
    expect(solver.factor(matrix.entries, 1)).toBe(true);
    const x = b.slice();
    solver.solve(x);
    expect(normwiseError(matrix, 1, x, b)).toBeLessThan(1e-15);
  });

  test('singular: pivots by size say so', () => {
    const singular = sparse([
      [-1, 1],
      [1, -1],
    ]);
    expect(pivotingSolver(singular.pattern, Int32Array.of(0, 1)).factor(singular.entries, 0)).toBe(false);
  });
});

test('the order of elimination keeps an arrow matrix free of fill-in', () => {
  const size = 50;
  const arrow = sparse(
    Array.from({ length: size }, (_, i) =>
      Array.from({ length: size }, (_, j) => (i === 0 || j === 0 || i === j ? 1 : null)),
    ),
  );
  const symbolic = factorizeSymbolically(arrow.pattern);
  expect(factorLength(symbolic)).toBe(arrow.entries.length);
  expect(symbolic.order.indexOf(0)).toBeGreaterThanOrEqual(size - 2);
});
