import type { Column } from './column.ts';

type Cell = Column['values'][number];

const plain = (value: unknown): Cell =>
  typeof value === 'number' || typeof value === 'string'
    ? value
    : value === undefined || value === null
      ? null
      : JSON.stringify(value);

/** Rows held anywhere in a specification: `data.values`, or the named `datasets`. */
function rowsOf(spec: Readonly<Record<string, unknown>>): readonly Readonly<Record<string, unknown>>[] {
  const { data, datasets } = spec as { data?: { values?: unknown }; datasets?: Record<string, unknown> };
  const held = [data?.values, ...Object.values(datasets ?? {})].find(Array.isArray);
  return (held ?? []).filter((row) => typeof row === 'object' && row !== null);
}

/** The numbers of a plot as columns, for its table and its data. */
export function columnsOf(spec: Readonly<Record<string, unknown>>): readonly Column[] {
  const rows = rowsOf(spec);
  return Object.keys(rows[0] ?? {}).map((name) => ({
    name,
    values: rows.map((row) => plain(row[name])),
  }));
}
