import type { SparseColumns } from './sparse.ts';

/** A block of a matrix: its own numbering, and the row of the whole matrix for each of its rows. */
export interface Block {
  readonly rows: Int32Array;
  readonly matrix: SparseColumns;
}

/** Whether no column has more than two entries. */
export function onlyPairs(matrix: SparseColumns): boolean {
  for (let column = 0; column < matrix.columnCount; column++) {
    if (matrix.offsets[column + 1]! - matrix.offsets[column]! > 2) return false;
  }
  return true;
}

/**
 * The connected components of the bipartite graph of rows and columns, in the order of their first row. A row without
 * entries is a block of its own; empty columns belong to none.
 */
export function connectedBlocks(matrix: SparseColumns): Block[] {
  const { rowCount, columnCount, offsets, rows } = matrix;
  const component = components(matrix);
  let count = 0;
  for (let row = 0; row < rowCount; row++) if (component[row]! >= count) count = component[row]! + 1;
  if (count === 1 && allColumnsFilled(matrix)) {
    return [{ rows: Int32Array.from({ length: rowCount }, (_, row) => row), matrix }];
  }
  const place = new Int32Array(rowCount);
  const rowCounts = new Int32Array(count);
  for (let row = 0; row < rowCount; row++) place[row] = rowCounts[component[row]!]!++;
  const columnCounts = new Int32Array(count);
  const entryCounts = new Int32Array(count);
  for (let column = 0; column < columnCount; column++) {
    const start = offsets[column]!;
    const length = offsets[column + 1]! - start;
    if (length === 0) continue;
    columnCounts[component[rows[start]!]!]!++;
    entryCounts[component[rows[start]!]!]! += length;
  }
  const blocks = Array.from({ length: count }, (_, c) => ({
    rows: new Int32Array(rowCounts[c]!),
    matrix: {
      rowCount: rowCounts[c]!,
      columnCount: columnCounts[c]!,
      offsets: new Int32Array(columnCounts[c]! + 1),
      rows: new Int32Array(entryCounts[c]!),
      values: new Float64Array(entryCounts[c]!),
    },
  }));
  for (let row = 0; row < rowCount; row++) blocks[component[row]!]!.rows[place[row]!] = row;
  const filled = new Int32Array(count);
  for (let column = 0; column < columnCount; column++) {
    const start = offsets[column]!;
    const end = offsets[column + 1]!;
    if (start === end) continue;
    const c = component[rows[start]!]!;
    const block = blocks[c]!.matrix;
    const at = filled[c]!++;
    let entry = block.offsets[at]!;
    for (let k = start; k < end; k++) {
      block.rows[entry] = place[rows[k]!]!;
      block.values[entry++] = matrix.values[k]!;
    }
    block.offsets[at + 1] = entry;
  }
  return blocks;
}

function allColumnsFilled(matrix: SparseColumns): boolean {
  for (let column = 0; column < matrix.columnCount; column++) {
    if (matrix.offsets[column] === matrix.offsets[column + 1]) return false;
  }
  return true;
}

/** Component of each row, numbered in the order of first rows. */
function components({ rowCount, columnCount, offsets, rows }: SparseColumns): Int32Array {
  const parent = Int32Array.from({ length: rowCount }, (_, row) => row);
  const find = (row: number) => {
    let at = row;
    while (parent[at] !== at) {
      parent[at] = parent[parent[at]!]!;
      at = parent[at]!;
    }
    return at;
  };
  for (let column = 0; column < columnCount; column++) {
    for (let k = offsets[column]! + 1; k < offsets[column + 1]!; k++) {
      const a = find(rows[k - 1]!);
      const b = find(rows[k]!);
      // The smaller index is the root, so that roots meet in order below.
      if (a < b) parent[b] = a;
      else if (b < a) parent[a] = b;
    }
  }
  const number = new Int32Array(rowCount);
  let count = 0;
  for (let row = 0; row < rowCount; row++) {
    const root = find(row);
    number[row] = root === row ? count++ : number[root]!;
  }
  return number;
}
