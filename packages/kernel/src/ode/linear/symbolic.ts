import type { SparsePattern } from '../problem.ts';

/**
 * Where a factorisation without row exchanges has its entries. Rows and columns are numbered in the order of
 * elimination: position q of `order` is the original index, `place` its inverse. `lower[q]` and `upper[q]` are the
 * ascending places of the entries right of and below the diagonal: row q of U, column q of L.
 */
export interface SymbolicFactorization {
  readonly size: number;
  readonly order: Int32Array;
  readonly place: Int32Array;
  readonly lower: readonly Int32Array[];
  readonly upper: readonly Int32Array[];
  /** Multiply-subtract operations of one factorisation. */
  readonly work: number;
}

/**
 * Chooses the order of elimination on the diagonal by least (row entries − 1)(column entries − 1), the smallest index
 * on a tie, and follows the fill-in (Markowitz 1957). The diagonal counts as full.
 */
export function factorizeSymbolically(pattern: SparsePattern): SymbolicFactorization {
  const { size } = pattern;
  const rows = Array.from({ length: size }, (_, i) => new Set([i]));
  const columns = Array.from({ length: size }, (_, i) => new Set([i]));
  for (let i = 0; i < size; i++) {
    for (let e = pattern.rowStart[i]!; e < pattern.rowStart[i + 1]!; e++) {
      const j = pattern.columns[e]!;
      rows[i]!.add(j);
      columns[j]!.add(i);
    }
  }
  const cost = (i: number): number => (rows[i]!.size - 1) * (columns[i]!.size - 1);
  const queue = new CostQueue(size, cost);
  const order = new Int32Array(size);
  const place = new Int32Array(size);
  const below: number[][] = [];
  const right: number[][] = [];
  let work = 0;
  for (let q = 0; q < size; q++) {
    const pivot = queue.pop();
    order[q] = pivot;
    place[pivot] = q;
    const inRow = [...rows[pivot]!].filter((j) => j !== pivot);
    const inColumn = [...columns[pivot]!].filter((i) => i !== pivot);
    right.push(inRow);
    below.push(inColumn);
    work += inRow.length * inColumn.length;
    for (const i of inColumn) {
      rows[i]!.delete(pivot);
      for (const j of inRow) {
        rows[i]!.add(j);
        columns[j]!.add(i);
      }
    }
    for (const j of inRow) columns[j]!.delete(pivot);
    for (const i of inColumn) queue.update(i);
    for (const j of inRow) queue.update(j);
  }
  const placed = (lists: number[][]): Int32Array[] =>
    lists.map((entries) => Int32Array.from(entries, (index) => place[index]!).sort());
  return { size, order, place, lower: placed(below), upper: placed(right), work };
}

/** Indices by cost, the smallest cost first and the smallest index on a tie; a binary heap with lazy deletion. */
class CostQueue {
  private readonly heap: number[] = [];
  private readonly current: Float64Array;
  private readonly size: number;
  private readonly cost: (index: number) => number;

  constructor(size: number, cost: (index: number) => number) {
    this.size = size;
    this.cost = cost;
    this.current = new Float64Array(size).fill(-1);
    for (let i = 0; i < size; i++) this.update(i);
  }

  update(index: number): void {
    const cost = this.cost(index);
    if (this.current[index] === cost) return;
    this.current[index] = cost;
    this.heap.push(cost * this.size + index);
    this.up(this.heap.length - 1);
  }

  pop(): number {
    for (;;) {
      const key = this.heap[0]!;
      const last = this.heap.pop()!;
      if (this.heap.length > 0) {
        this.heap[0] = last;
        this.down();
      }
      const index = key % this.size;
      if (this.current[index] === (key - index) / this.size) {
        this.current[index] = -1;
        return index;
      }
    }
  }

  private up(from: number): void {
    const { heap } = this;
    let child = from;
    const key = heap[child]!;
    while (child > 0) {
      const parent = (child - 1) >> 1;
      if (heap[parent]! <= key) break;
      heap[child] = heap[parent]!;
      child = parent;
    }
    heap[child] = key;
  }

  private down(): void {
    const { heap } = this;
    const key = heap[0]!;
    let parent = 0;
    for (;;) {
      let child = 2 * parent + 1;
      if (child >= heap.length) break;
      if (child + 1 < heap.length && heap[child + 1]! < heap[child]!) child++;
      if (heap[child]! >= key) break;
      heap[parent] = heap[child]!;
      parent = child;
    }
    heap[parent] = key;
  }
}
