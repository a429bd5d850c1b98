import {
  type Complaint,
  setRowField,
  type TableField,
  tableFields,
  type TableRow,
} from '@stillroom/shared/notation';

/** A row of the table with a key that stays with it while rows come and go around it. */
export interface KeyedRow extends TableRow {
  readonly key: number;
}

const isSame = (a: TableRow, b: TableRow): boolean => tableFields.every((field) => a[field] === b[field]);

/**
 * Gives the rows of a changed text the keys they had: rows that are as they were keep theirs from both ends; of those
 * between, the ones that were rewritten in place. `fresh` gives a new key.
 */
export function keyRows(
  before: readonly KeyedRow[],
  rows: readonly TableRow[],
  fresh: () => number,
): KeyedRow[] {
  const shorter = Math.min(before.length, rows.length);
  const agree = (a: KeyedRow | undefined, b: TableRow | undefined): boolean =>
    a !== undefined && b !== undefined && isSame(a, b);
  let start = 0;
  while (start < shorter && agree(before[start], rows[start])) start += 1;
  let end = 0;
  while (end < shorter - start && agree(before.at(-1 - end), rows.at(-1 - end))) end += 1;
  return rows.map((row, i) => {
    const fromEnd = rows.length - i;
    const old =
      i < start
        ? before[i]
        : fromEnd <= end
          ? before[before.length - fromEnd]
          : i < before.length - end
            ? before[i]
            : undefined;
    return { ...row, key: old?.key ?? fresh() };
  });
}

/** What is wrong with a row and in which field; `field` of what concerns all of it is the reaction. */
export interface RowComplaint {
  readonly complaint: Complaint;
  readonly field: TableField;
}

/** The first line of the row at a place, and the field there; null where no row stands. Line and column count from 1. */
function placeOf(
  lines: readonly string[],
  begins: ReadonlySet<number>,
  at: number,
  column: number,
): { readonly line: number; readonly field: TableField } | null {
  let line = at;
  let before = (lines[line - 1] ?? '').slice(0, column - 1);
  while (!begins.has(line) && line > 1 && /\\\s*$/.test(lines[line - 2] ?? '')) {
    line -= 1;
    before = (lines[line - 1] ?? '') + before;
  }
  if (!begins.has(line)) return null;
  const bars = Math.min(before.split('|').length - 1, tableFields.length - 1);
  return { line, field: tableFields[bars] ?? 'reaction' };
}

/** The row and field in which an offset of the text lies; null where no row stands. */
export function fieldAt(
  text: string,
  rows: readonly KeyedRow[],
  offset: number,
): { readonly key: number; readonly field: TableField } | null {
  const before = text.slice(0, offset).split('\n');
  const begins = new Set(rows.map(({ line }) => line));
  const place = placeOf(text.split('\n'), begins, before.length, (before.at(-1)?.length ?? 0) + 1);
  const key = rows.find(({ line }) => line === place?.line)?.key;
  return place === null || key === undefined ? null : { key, field: place.field };
}

/** Where the words of a field begin in the text; null for a row that is not there. */
export function fieldStart(text: string, row: number, field: TableField): number | null {
  const change = setRowField(text, row, field, '');
  if (change === null) return null;
  const blanks = /^[ \t]*/.exec(text.slice(change.from, change.to))?.[0].length ?? 0;
  return change.from + blanks;
}

/** The complaints of a text by the first line of the row they are about, and those that are about no row. */
export function complaintsByRow(
  text: string,
  rows: readonly TableRow[],
  complaints: readonly Complaint[],
): { readonly of: ReadonlyMap<number, readonly RowComplaint[]>; readonly others: readonly Complaint[] } {
  const of = new Map<number, RowComplaint[]>();
  const others: Complaint[] = [];
  if (complaints.length === 0) return { of, others };
  const begins = new Set(rows.map(({ line }) => line));
  const lines = text.split('\n');
  for (const complaint of complaints) {
    const place = placeOf(lines, begins, complaint.line, complaint.column);
    if (place === null) {
      others.push(complaint);
      continue;
    }
    const list = of.get(place.line) ?? [];
    list.push({ complaint, field: place.field });
    of.set(place.line, list);
  }
  return { of, others };
}
