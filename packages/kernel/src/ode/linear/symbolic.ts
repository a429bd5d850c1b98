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

/** About how many updates lie between two calls of the checkpoint. */
const checkpointWork = 100_000;

/**
 * Chooses the order of elimination on the diagonal by least (row entries − 1)(column entries − 1), the smallest index
 * on a tie, and follows the fill-in (Markowitz 1957). The diagonal counts as full. `checkpoint` may throw to end the work.
 */
export function factorizeSymbolically(
  pattern: SparsePattern,
  checkpoint: () => void = () => undefined,
): SymbolicFactorization {
  const { size } = pattern;
  const { rows, columns } = offDiagonal(pattern);
  const queue = new CostQueue(size, (i) => rows[i]!.length * columns[i]!.length);
  const order = new Int32Array(size);
  const place = new Int32Array(size);
  const mark = new Int32Array(size);
  let epoch = 0;
  /** `list` of index `own` without the pivot and with `others`. */
  const merge = (list: number[], own: number, pivot: number, others: readonly number[]): void => {
    epoch++;
    mark[own] = epoch;
    for (let n = 0; n < list.length; n++) {
      if (list[n] === pivot) {
        list[n] = list.at(-1)!;
        list.pop();
      }
      if (n < list.length) mark[list[n]!] = epoch;
    }
    for (const other of others) if (mark[other] !== epoch) list.push(other);
  };
  let work = 0;
  let next = checkpointWork;
  for (let q = 0; q < size; q++) {
    const pivot = queue.pop();
    order[q] = pivot;
    place[pivot] = q;
    const inRow = rows[pivot]!;
    const inColumn = columns[pivot]!;
    work += inRow.length * inColumn.length;
    for (const i of inColumn) merge(rows[i]!, i, pivot, inRow);
    for (const j of inRow) merge(columns[j]!, j, pivot, inColumn);
    for (const i of inColumn) queue.update(i);
    for (const j of inRow) queue.update(j);
    if (work + q >= next) {
      checkpoint();
      next = work + q + checkpointWork;
    }
  }
  const placed = (lists: readonly number[][]): Int32Array[] =>
    Array.from(order, (pivot) => Int32Array.from(lists[pivot]!, (index) => place[index]!).sort());
  return { size, order, place, lower: placed(columns), upper: placed(rows), work };
}

/** The entries off the diagonal: columns by row and rows by column. */
function offDiagonal({ size, rowStart, columns: entries }: SparsePattern): {
  rows: number[][];
  columns: number[][];
} {
  const rows = Array.from({ length: size }, (): number[] => []);
  const columns = Array.from({ length: size }, (): number[] => []);
  for (let i = 0; i < size; i++) {
    for (let e = rowStart[i]!; e < rowStart[i + 1]!; e++) {
      const j = entries[e]!;
      if (i === j) continue;
      rows[i]!.push(j);
      columns[j]!.push(i);
    }
  }
  return { rows, columns };
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
