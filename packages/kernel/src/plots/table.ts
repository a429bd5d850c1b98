import type { CellKind } from '@stillroom/shared/cells';
import { CellFailure } from '../engine/failure.ts';

export type PlotRow = Readonly<Record<string, string | number | boolean | null>>;

const isRecord = (value: unknown): value is Readonly<Record<string, unknown>> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

function bare(value: unknown): string | number | boolean | null {
  return typeof value === 'string' || typeof value === 'number' || typeof value === 'boolean' ? value : null;
}

/** Columns of equal length, by name, as rows. */
function rowsOf(columns: ReadonlyMap<string, readonly unknown[]>): PlotRow[] {
  const length = Math.max(0, ...[...columns.values()].map((column) => column.length));
  return Array.from({ length }, (_, index) =>
    Object.fromEntries([...columns].map(([name, column]) => [name, bare(column[index])])),
  );
}

/** A course: `t`, every species, every derived value. */
function courseRows(result: Readonly<Record<string, unknown>>): PlotRow[] {
  const columns = new Map<string, readonly unknown[]>();
  if (Array.isArray(result['times'])) columns.set('t', result['times']);
  for (const part of [result['species'], result['derived']]) {
    if (!isRecord(part)) continue;
    for (const [name, values] of Object.entries(part)) if (Array.isArray(values)) columns.set(name, values);
  }
  return rowsOf(columns);
}

function entryRows(entries: readonly unknown[]): PlotRow[] {
  return entries.map((entry, index) => {
    if (isRecord(entry))
      return Object.fromEntries(Object.entries(entry).map(([key, value]) => [key, bare(value)]));
    if (Array.isArray(entry))
      return Object.fromEntries(entry.map((value, place) => [`c${place}`, bare(value)]));
    return { index, value: bare(entry) };
  });
}

/** An object of equally long lists is a table by columns; a list is one by rows. */
function valueRows(value: unknown): PlotRow[] | null {
  if (Array.isArray(value)) return entryRows(value);
  if (!isRecord(value)) return null;
  const columns = Object.entries(value).filter((entry): entry is [string, unknown[]] =>
    Array.isArray(entry[1]),
  );
  return columns.length === 0 ? null : rowsOf(new Map(columns));
}

/**
 * The result of a cell as the table that a Vega-Lite text draws from: of a trajectory a row for each time with `t`, its
 * species and derived values; of a script its value, a list of rows or an object of columns; of other kinds their lists
 * of numbers.
 *
 * @throws CellFailure where a result holds no table
 */
export function plotTable(kind: CellKind, result: unknown, name: string): PlotRow[] {
  const record = isRecord(result) ? result : {};
  const rows =
    kind === 'trajectory' ? courseRows(record) : valueRows(kind === 'script' ? record['value'] : record);
  if (rows === null || rows.length === 0) {
    throw new CellFailure(`${name} holds no table to draw.`, {
      hint: 'A trajectory does, and a script that returns a list of rows.',
    });
  }
  return rows;
}
