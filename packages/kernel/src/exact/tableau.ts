/**
 * The simplex tableau over the integers: entry / `denominator` is the rational tableau. A pivot keeps everything
 * integral because every entry is a minor of the starting matrix (Edmonds 1967; Bareiss 1968). The last column is the
 * right-hand side.
 */
export interface Tableau {
  readonly rows: number;
  readonly columns: number;
  /** −1, 0 or 1. */
  sign(row: number, column: number): number;
  /** The sign of entry(row, a) − entry(row, b). */
  compareInRow(row: number, a: number, b: number): number;
  /** The sign of right(a)/entry(a, column) − right(b)/entry(b, column), for positive entries. */
  compareRatios(a: number, b: number, column: number): number;
  /** Exchanges a basic variable; false when the numbers outgrow this kind of tableau, which is then spoilt. */
  pivot(row: number, column: number): boolean;
  entry(row: number, column: number): bigint;
  denominator(): bigint;
}

const LIMIT = Number.MAX_SAFE_INTEGER;

/**
 * Entries below 2^53 held in doubles: all that the matrices of reaction networks usually need, and much faster. Pivots
 * change the rows handed in.
 */
export function smallTableau(rows: readonly Float64Array[]): Tableau {
  const columns = rows[0]?.length ?? 0;
  const support = new Int32Array(columns);
  let scale = 1;
  return {
    rows: rows.length,
    columns,
    sign: (row, column) => Math.sign(rows[row]![column]!),
    compareInRow: (row, a, b) => Math.sign(rows[row]![a]! - rows[row]![b]!),
    compareRatios(a, b, column) {
      const left = rows[a]![columns - 1]! * rows[b]![column]!;
      const right = rows[b]![columns - 1]! * rows[a]![column]!;
      if (Math.abs(left) <= LIMIT && Math.abs(right) <= LIMIT) return Math.sign(left - right);
      const difference =
        BigInt(rows[a]![columns - 1]!) * BigInt(rows[b]![column]!) -
        BigInt(rows[b]![columns - 1]!) * BigInt(rows[a]![column]!);
      return difference > 0n ? 1 : difference < 0n ? -1 : 0;
    },
    pivot(row, column) {
      const chosen = rows[row]!;
      const pivot = chosen[column]!;
      let entries = 0;
      for (let k = 0; k < columns; k++) if (chosen[k] !== 0) support[entries++] = k;
      for (let i = 0; i < rows.length; i++) {
        const target = rows[i]!;
        const factor = target[column]!;
        if (i === row || (factor === 0 && pivot === scale)) continue;
        const fits =
          pivot === scale
            ? subtract(target, chosen, factor, scale, support, entries)
            : combine(target, chosen, pivot, factor, scale);
        if (!fits) return false;
      }
      scale = pivot;
      return true;
    },
    entry: (row, column) => BigInt(rows[row]![column]!),
    denominator: () => BigInt(scale),
  };
}

/** The same tableau on integers of any length. Pivots change the rows handed in. */
export function longTableau(rows: bigint[][]): Tableau {
  const columns = rows[0]?.length ?? 0;
  let scale = 1n;
  const signOf = (value: bigint): number => (value > 0n ? 1 : value < 0n ? -1 : 0);
  return {
    rows: rows.length,
    columns,
    sign: (row, column) => signOf(rows[row]![column]!),
    compareInRow: (row, a, b) => signOf(rows[row]![a]! - rows[row]![b]!),
    compareRatios: (a, b, column) =>
      signOf(rows[a]![columns - 1]! * rows[b]![column]! - rows[b]![columns - 1]! * rows[a]![column]!),
    pivot(row, column) {
      const chosen = rows[row]!;
      const pivot = chosen[column]!;
      for (let i = 0; i < rows.length; i++) {
        const factor = rows[i]![column]!;
        if (i === row || (factor === 0n && pivot === scale)) continue;
        rows[i] = rows[i]!.map((entry, k) => (entry * pivot - factor * chosen[k]!) / scale);
      }
      scale = pivot;
      return true;
    },
    entry: (row, column) => rows[row]![column]!,
    denominator: () => scale,
  };
}

/** row·pivot − factor·chosen, divided by the scale. False when a product is not exact; the row is then spoilt. */
function combine(
  row: Float64Array,
  chosen: Float64Array,
  pivot: number,
  factor: number,
  scale: number,
): boolean {
  let largest = 0;
  for (let k = 0; k < row.length; k++) {
    const kept = row[k]! * pivot;
    const taken = factor * chosen[k]!;
    if (kept === 0 && taken === 0) continue;
    largest = Math.max(largest, Math.abs(kept) + Math.abs(taken));
    const difference = kept - taken;
    row[k] = difference === 0 ? 0 : difference / scale;
  }
  return largest <= LIMIT;
}

/** The same where the pivot is the scale: only the entries of the chosen row matter. */
function subtract(
  row: Float64Array,
  chosen: Float64Array,
  factor: number,
  scale: number,
  support: Int32Array,
  entries: number,
): boolean {
  let largest = 0;
  for (let j = 0; j < entries; j++) {
    const k = support[j]!;
    const taken = factor * chosen[k]!;
    const difference = row[k]! - taken / scale;
    largest = Math.max(largest, Math.abs(taken), Math.abs(difference));
    row[k] = difference;
  }
  return largest <= LIMIT;
}
