import type { LinearCondition, SparseVector } from '../exact/index.ts';
import { leftKernel, solveLinear } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { stoichiometry } from '../network/index.ts';
import type { Partition } from './partition.ts';
import { partitionByLabel } from './partition.ts';
import { UnionFind } from './union-find.ts';

/** Linear programmes beyond this many entries are not tried. */
const PROGRAMME_ENTRIES = 150_000;
/** Pivots times entries of one programme. */
const PROGRAMME_WORK = 40_000_000;

/**
 * Whether N v = 0 has a solution v that is positive at every arrow; null where the network is too large to be decided.
 *
 * Arrows inside a strong linkage class lie on cycles, so their reaction vectors may be used with either sign and it remains
 * to balance the others, J, modulo their span: with L a basis of the laws of the strong part, L N_J v_J = 0, v_J > 0. A row of
 * L N_J of one sign decides against, no entries decide for; the rest is a linear programme for each connected block of
 * L N_J, solved exactly.
 */
export function consistent(network: StructuralNetwork, strong: Partition): boolean | null {
  const { between, inside } = splitArrows(network, strong);
  if (between.length === 0) return true;
  if (someSpeciesOnlyMadeOrUsed(network, between, inside)) return false;
  const laws = leftKernel(stoichiometry(network, inside).matrix);
  if (laws === null) return null;
  const changes = changesOfLaws(network, laws.basis, between);
  if (changes.some(ofOneSign)) return false;
  if (!laws.complete) return null;
  let undecided = false;
  for (const block of blocks(changes, between.length)) {
    const balanced = balancePositively(block);
    if (balanced === false) return false;
    if (balanced === null) undecided = true;
  }
  return undecided ? null : true;
}

function splitArrows(
  network: StructuralNetwork,
  strong: Partition,
): { between: Int32Array; inside: Int32Array } {
  const { from, to, count } = network.arrows;
  const between = new Int32Array(count);
  const inside = new Int32Array(count);
  let outer = 0;
  let inner = 0;
  for (let arrow = 0; arrow < count; arrow++) {
    if (strong.of[from[arrow]!] === strong.of[to[arrow]!]) inside[inner++] = arrow;
    else between[outer++] = arrow;
  }
  return { between: between.subarray(0, outer), inside: inside.subarray(0, inner) };
}

/** The cheapest refutation: a species that no arrow on a cycle changes and that all others change in one sense. */
function someSpeciesOnlyMadeOrUsed(
  network: StructuralNetwork,
  between: Int32Array,
  inside: Int32Array,
): boolean {
  const rising = 1;
  const falling = 2;
  const free = 4;
  const seen = new Uint8Array(network.species.length);
  const changes = stoichiometry(network, between).matrix;
  for (let k = 0; k < changes.rows.length; k++) {
    seen[changes.rows[k]!]! |= changes.values[k]! > 0 ? rising : falling;
  }
  for (const species of stoichiometry(network, inside).matrix.rows) seen[species]! |= free;
  return seen.some((senses) => senses === rising || senses === falling);
}

/** How each arrow of J changes one law: column of J → change, without zeros. */
type LawChange = ReadonlyMap<number, bigint>;

function changesOfLaws(
  network: StructuralNetwork,
  laws: readonly SparseVector[],
  arrows: Int32Array,
): LawChange[] {
  const { matrix } = stoichiometry(network, arrows);
  const bySpecies = new Map<number, { column: number; value: bigint }[]>();
  for (let column = 0; column < matrix.columnCount; column++) {
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      const entry = { column, value: BigInt(matrix.values[k]!) };
      const known = bySpecies.get(matrix.rows[k]!);
      if (known) known.push(entry);
      else bySpecies.set(matrix.rows[k]!, [entry]);
    }
  }
  return laws.map((law) => {
    const change = new Map<number, bigint>();
    law.indices.forEach((species, i) => {
      for (const { column, value } of bySpecies.get(species) ?? []) {
        change.set(column, (change.get(column) ?? 0n) + law.values[i]! * value);
      }
    });
    for (const [column, value] of change) if (value === 0n) change.delete(column);
    return change;
  });
}

function ofOneSign(change: LawChange): boolean {
  if (change.size === 0) return false;
  const values = [...change.values()];
  return values.every((value) => value > 0n) || values.every((value) => value < 0n);
}

/** Rows that share columns, directly or through others. */
function blocks(changes: readonly LawChange[], columnCount: number): LawChange[][] {
  const rows = changes.filter((change) => change.size > 0);
  const sets = new UnionFind(rows.length);
  const firstRow = new Int32Array(columnCount).fill(-1);
  rows.forEach((row, i) => {
    for (const column of row.keys()) {
      if (firstRow[column]! < 0) firstRow[column] = i;
      else sets.union(firstRow[column]!, i);
    }
  });
  const partition = partitionByLabel(sets.labels());
  const grouped: LawChange[][] = Array.from({ length: partition.count }, () => []);
  rows.forEach((row, i) => grouped[partition.of[i]!]!.push(row));
  return grouped;
}

/** Whether rows · v = 0 has a positive solution; v = 1 + u, u ≥ 0. Equal columns count once: their sum is what matters. */
function balancePositively(rows: readonly LawChange[]): boolean | null {
  if (rows.every(sumsToZero)) return true;
  const columns = distinctColumns(rows);
  const entries = rows.length * columns.length;
  if (entries > PROGRAMME_ENTRIES) return null;
  const conditions: LinearCondition[] = rows.map((_, row) => {
    const terms = columns.flatMap((column, variable) => {
      const value = column.get(row);
      return value === undefined ? [] : [[variable, value] as const];
    });
    const right = -terms.reduce((sum, [, value]) => sum + value, 0n);
    return { terms, relation: '=', right };
  });
  const pivots = Math.ceil(PROGRAMME_WORK / entries);
  const outcome = solveLinear({ variables: columns.length, conditions }, pivots);
  return outcome.kind === 'unfinished' ? null : outcome.kind === 'feasible';
}

/** Whether v = 1 balances a row. */
function sumsToZero(row: LawChange): boolean {
  let sum = 0n;
  for (const value of row.values()) sum += value;
  return sum === 0n;
}

function distinctColumns(rows: readonly LawChange[]): ReadonlyMap<number, bigint>[] {
  const columns = new Map<number, Map<number, bigint>>();
  rows.forEach((row, i) => {
    for (const [column, value] of row) {
      const known = columns.get(column);
      if (known) known.set(i, value);
      else columns.set(column, new Map([[i, value]]));
    }
  });
  const distinct = new Map<string, Map<number, bigint>>();
  for (const column of columns.values()) {
    distinct.set([...column].map(([row, value]) => `${row}:${value}`).join(), column);
  }
  return [...distinct.values()];
}
