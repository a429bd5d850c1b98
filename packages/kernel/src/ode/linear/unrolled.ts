import { Graph, makeTape, type Node, type Output, spaces, type Tape } from '../../program/index.ts';
import type { SparsePattern } from '../problem.ts';
import type { SymbolicFactorization } from './symbolic.ts';

/** How many numbers a stored factorisation takes: 1/pivot, column of L, row of U for each place. */
export function factorLength(symbolic: SymbolicFactorization): number {
  let length = symbolic.size;
  for (let q = 0; q < symbolic.size; q++) length += symbolic.lower[q]!.length + symbolic.upper[q]!.length;
  return length;
}

/**
 * The factorisation L U = shift · I − J as one routine without loops. Reads the entries of J at the first base and
 * `shift` at its slot, writes the factors at the second base, and the largest multiplier |l| to `growthSlot`: where it
 * is large the fixed order of pivots has failed.
 */
export function unrolledFactor(
  pattern: SparsePattern,
  symbolic: SymbolicFactorization,
  shiftSlot: number,
  growthSlot: number,
): Tape {
  const { size, order, place, lower, upper } = symbolic;
  const graph = new Graph();
  const shift = graph.load(shiftSlot);
  const rows = Array.from({ length: size }, (_, q) => new Map<number, Node>([[q, shift]]));
  for (let i = 0; i < size; i++) {
    const row = rows[place[i]!]!;
    for (let e = pattern.rowStart[i]!; e < pattern.rowStart[i + 1]!; e++) {
      const column = place[pattern.columns[e]!]!;
      row.set(column, graph.subtract(row.get(column) ?? graph.constant(0), graph.load(e, spaces.first)));
    }
  }
  const outputs: Output[] = [];
  const write = (node: Node): void => {
    outputs.push({ node, slot: outputs.length, space: spaces.second });
  };
  let growth = graph.constant(0);
  for (let q = 0; q < order.length; q++) {
    const inverse = graph.divide(graph.constant(1), rows[q]!.get(q)!);
    write(inverse);
    for (const i of lower[q]!) {
      const row = rows[i]!;
      const multiplier = graph.multiply(row.get(q)!, inverse);
      write(multiplier);
      growth = graph.max(growth, graph.abs(multiplier));
      for (const j of upper[q]!) {
        const product = graph.multiply(multiplier, rows[q]!.get(j)!);
        row.set(j, graph.subtract(row.get(j) ?? graph.constant(0), product));
      }
    }
    for (const j of upper[q]!) write(rows[q]!.get(j)!);
  }
  outputs.push({ node: growth, slot: growthSlot, space: spaces.fixed });
  return makeTape(graph, outputs);
}

/**
 * Solves with factors stored at the fixed place `factors`: reads b at the first base and `addend` at its fixed place,
 * writes the solution for b + addend at the second base.
 */
export function unrolledSolve(symbolic: SymbolicFactorization, factors: number, addend: number): Tape {
  const { size, order, lower, upper } = symbolic;
  const graph = new Graph();
  const x = Array.from(order, (index) =>
    graph.add(graph.load(index, spaces.first), graph.load(addend + index)),
  );
  const start = new Int32Array(size);
  let slot = factors;
  for (let q = 0; q < size; q++) {
    start[q] = slot;
    lower[q]!.forEach((i, n) => {
      x[i] = graph.subtract(x[i]!, graph.multiply(graph.load(start[q]! + 1 + n), x[q]!));
    });
    slot += 1 + lower[q]!.length + upper[q]!.length;
  }
  for (let q = size - 1; q >= 0; q--) {
    const row = start[q]! + 1 + lower[q]!.length;
    upper[q]!.forEach((j, n) => {
      x[q] = graph.subtract(x[q]!, graph.multiply(graph.load(row + n), x[j]!));
    });
    x[q] = graph.multiply(x[q]!, graph.load(start[q]!));
  }
  return makeTape(
    graph,
    Array.from(order, (index, q) => ({ node: x[q]!, slot: index, space: spaces.second })),
  );
}
