import { rowIndex } from '../sparse.ts';
import type { RowIndex } from '../sparse.ts';
import type { ModularColumns } from './modular-columns.ts';

/**
 * How the equations Σ_i w_i M[i, c] = 0 determine one unknown after another. Every row of the matrix is exactly one of
 *
 * - peeled: at its turn it stood in one column only, which is taken out with it; that column gives w there, so peeled
 *   rows are evaluated last, in reverse order;
 * - resolved: at its turn it was the only undetermined row of its column;
 * - core: a parameter, chosen when no column determined anything;
 * - free: a parameter that no remaining column restricts.
 *
 * `unused` columns restrict the core.
 */
export interface EliminationOrder {
  readonly peeledRows: Int32Array;
  readonly peeledColumns: Int32Array;
  readonly resolvedRows: Int32Array;
  readonly resolvedColumns: Int32Array;
  readonly core: Int32Array;
  readonly free: Int32Array;
  readonly unused: Int32Array;
}

const UNDETERMINED = 0;
const DETERMINED = 1;

/** Finds an order with few core rows; uses the pattern of the matrix only. About linear. */
export function eliminationOrder(matrix: ModularColumns): EliminationOrder {
  const byRow = rowIndex(matrix);
  const rowState = new Uint8Array(matrix.rowCount);
  const columnUsed = new Uint8Array(matrix.columnCount);
  const degree = new Int32Array(matrix.rowCount);
  for (let row = 0; row < matrix.rowCount; row++) degree[row] = byRow.offsets[row + 1]! - byRow.offsets[row]!;
  const peeled = peel(matrix, byRow, rowState, columnUsed, degree);
  const inactivated = new Inactivation(matrix, byRow, rowState, columnUsed, degree).run();
  const unused: number[] = [];
  for (let column = 0; column < matrix.columnCount; column++) {
    if (columnUsed[column] === 0 && matrix.offsets[column + 1]! > matrix.offsets[column]!)
      unused.push(column);
  }
  return { ...peeled, ...inactivated, unused: Int32Array.from(unused) };
}

function peel(
  matrix: ModularColumns,
  byRow: RowIndex,
  rowState: Uint8Array,
  columnUsed: Uint8Array,
  degree: Int32Array,
): Pick<EliminationOrder, 'peeledRows' | 'peeledColumns' | 'free'> {
  const rows: number[] = [];
  const columns: number[] = [];
  const stack: number[] = [];
  for (let row = 0; row < matrix.rowCount; row++) if (degree[row] === 1) stack.push(row);
  for (let row = stack.pop(); row !== undefined; row = stack.pop()) {
    if (degree[row] !== 1 || rowState[row] !== UNDETERMINED) continue;
    let slot = byRow.offsets[row]!;
    while (columnUsed[byRow.columns[slot]!] === 1) slot++;
    const column = byRow.columns[slot]!;
    columnUsed[column] = 1;
    rowState[row] = DETERMINED;
    rows.push(row);
    columns.push(column);
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      const other = matrix.rows[k]!;
      if (--degree[other]! === 1) stack.push(other);
    }
  }
  const free: number[] = [];
  for (let row = 0; row < matrix.rowCount; row++) {
    if (rowState[row] === UNDETERMINED && degree[row] === 0) {
      rowState[row] = DETERMINED;
      free.push(row);
    }
  }
  return {
    peeledRows: Int32Array.from(rows),
    peeledColumns: Int32Array.from(columns),
    free: Int32Array.from(free),
  };
}

/**
 * Structured elimination with inactivation (in the manner of Lamacchia, Odlyzko 1990, and of decoders of fountain
 * codes): when no column determines a row, the row of largest degree in the largest component of the graph of columns
 * with two undetermined rows becomes a core row, because determining one row of such a component determines all.
 */
class Inactivation {
  readonly #matrix: ModularColumns;
  readonly #byRow: RowIndex;
  readonly #rowState: Uint8Array;
  readonly #columnUsed: Uint8Array;
  readonly #degree: Int32Array;
  /** Undetermined rows per unused column. */
  readonly #open: Int32Array;
  readonly #ready: Int32Array;
  #readyEnd = 0;
  readonly #parent: Int32Array;
  readonly #size: Int32Array;
  readonly #best: Int32Array;
  /** Components by size, possibly outdated; checked when taken. */
  readonly #bySize = new Map<number, number[]>();
  #largest = 1;
  #undetermined = 0;

  constructor(
    matrix: ModularColumns,
    byRow: RowIndex,
    rowState: Uint8Array,
    columnUsed: Uint8Array,
    degree: Int32Array,
  ) {
    this.#matrix = matrix;
    this.#byRow = byRow;
    this.#rowState = rowState;
    this.#columnUsed = columnUsed;
    this.#degree = degree;
    this.#open = new Int32Array(matrix.columnCount);
    this.#ready = new Int32Array(matrix.columnCount);
    this.#parent = Int32Array.from({ length: matrix.rowCount }, (_, row) => row);
    this.#best = this.#parent.slice();
    this.#size = new Int32Array(matrix.rowCount).fill(1);
  }

  run(): Pick<EliminationOrder, 'resolvedRows' | 'resolvedColumns' | 'core'> {
    const { offsets, rows, columnCount, rowCount } = this.#matrix;
    for (let row = 0; row < rowCount; row++) if (this.#rowState[row] === UNDETERMINED) this.#undetermined++;
    for (let column = 0; column < columnCount; column++) {
      if (this.#columnUsed[column] === 1) continue;
      let open = 0;
      for (let k = offsets[column]!; k < offsets[column + 1]!; k++) {
        if (this.#rowState[rows[k]!] === UNDETERMINED) open++;
      }
      this.#open[column] = open;
      this.#notice(column, open);
    }
    const resolvedRows = new Int32Array(this.#undetermined);
    const resolvedColumns = new Int32Array(this.#undetermined);
    const core: number[] = [];
    let resolved = 0;
    let taken = 0;
    const fallback = this.#undeterminedByDegree();
    let fallbackAt = 0;
    while (this.#undetermined > 0) {
      while (taken < this.#readyEnd) {
        const column = this.#ready[taken++]!;
        if (this.#columnUsed[column] === 1 || this.#open[column] !== 1) continue;
        const row = this.#openRow(column);
        this.#columnUsed[column] = 1;
        resolvedRows[resolved] = row;
        resolvedColumns[resolved++] = column;
        this.#determine(row);
      }
      if (this.#undetermined === 0) break;
      let row = this.#rowOfLargestComponent();
      if (row < 0) {
        while (this.#rowState[fallback[fallbackAt]!] !== UNDETERMINED) fallbackAt++;
        row = fallback[fallbackAt]!;
      }
      core.push(row);
      this.#determine(row);
    }
    return {
      resolvedRows: resolvedRows.subarray(0, resolved),
      resolvedColumns: resolvedColumns.subarray(0, resolved),
      core: Int32Array.from(core),
    };
  }

  #undeterminedByDegree(): Int32Array {
    const rows: number[] = [];
    for (let row = 0; row < this.#matrix.rowCount; row++) {
      if (this.#rowState[row] === UNDETERMINED) rows.push(row);
    }
    return Int32Array.from(rows.sort((a, b) => this.#degree[b]! - this.#degree[a]! || a - b));
  }

  #determine(row: number): void {
    this.#rowState[row] = DETERMINED;
    this.#undetermined--;
    const { offsets, columns } = this.#byRow;
    for (let k = offsets[row]!; k < offsets[row + 1]!; k++) {
      const column = columns[k]!;
      if (this.#columnUsed[column] === 0) this.#notice(column, --this.#open[column]!);
    }
  }

  #notice(column: number, open: number): void {
    if (open === 1) this.#ready[this.#readyEnd++] = column;
    else if (open === 2) this.#join(column);
  }

  #openRow(column: number): number {
    const { offsets, rows } = this.#matrix;
    let k = offsets[column]!;
    while (this.#rowState[rows[k]!] !== UNDETERMINED) k++;
    return rows[k]!;
  }

  #join(column: number): void {
    const { offsets, rows } = this.#matrix;
    let first = -1;
    for (let k = offsets[column]!; k < offsets[column + 1]!; k++) {
      if (this.#rowState[rows[k]!] !== UNDETERMINED) continue;
      if (first >= 0) {
        this.#unite(this.#find(first), this.#find(rows[k]!));
        return;
      }
      first = rows[k]!;
    }
  }

  #find(row: number): number {
    const parent = this.#parent;
    let at = row;
    while (parent[at] !== at) {
      parent[at] = parent[parent[at]!]!;
      at = parent[at]!;
    }
    return at;
  }

  #unite(a: number, b: number): void {
    if (a === b) return;
    const [big, small] = this.#size[a]! < this.#size[b]! ? [b, a] : [a, b];
    this.#parent[small] = big;
    this.#size[big]! += this.#size[small]!;
    const rival = this.#best[small]!;
    if (this.#degree[rival]! > this.#degree[this.#best[big]!]!) this.#best[big] = rival;
    const size = this.#size[big]!;
    const same = this.#bySize.get(size);
    if (same) same.push(big);
    else this.#bySize.set(size, [big]);
    if (size > this.#largest) this.#largest = size;
  }

  #rowOfLargestComponent(): number {
    for (; this.#largest > 1; this.#largest--) {
      const roots = this.#bySize.get(this.#largest);
      for (let root = roots?.pop(); root !== undefined; root = roots?.pop()) {
        const current = this.#parent[root] === root && this.#size[root] === this.#largest;
        if (current && this.#rowState[this.#best[root]!] === UNDETERMINED) return this.#best[root]!;
      }
    }
    return -1;
  }
}
