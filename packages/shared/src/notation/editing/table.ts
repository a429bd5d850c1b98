import { logicalLines, plainText } from '../lines.ts';
import type { LogicalLine } from '../lines.ts';
import { Scanner } from '../tokens.ts';
import { isStatementWord } from '../words.ts';
import { applyChanges } from './change.ts';
import type { TextChange } from './change.ts';

export const tableFields = ['reaction', 'constants', 'note'] as const;
export type TableField = (typeof tableFields)[number];

/** A row of the text as a row of a table: each field as it is written, without blanks around it. */
export type TableRow = { readonly line: number } & Readonly<Record<TableField, string>>;

/** The rows of a text in order of writing, sound or not; statements and comments are no rows. */
export function tableOf(text: string): TableRow[] {
  return rowLines(text).map((line) => {
    const [reaction, constants, note] = fieldsOf(line).map(({ from, to }) => plainText(text, from, to));
    return { line: line.line, reaction: reaction ?? '', constants: constants ?? '', note: note ?? '' };
  });
}

/**
 * The change that writes one field of the row-th row (from 0); null where there is no such row. Bars are added as needed;
 * what would end the field (a bar, `#`, a newline) becomes a blank.
 */
export function setRowField(text: string, row: number, field: TableField, value: string): TextChange | null {
  const line = rowLines(text)[row];
  if (!line) return null;
  const place = tableFields.indexOf(field);
  const clean = cleanField(field, value);
  const fields = fieldsOf(line);
  const span = fields[place];
  if (span) {
    const isLast = place === fields.length - 1;
    const insert = `${place > 0 ? ' ' : ''}${clean}${isLast && line.comment === null ? '' : ' '}`;
    return { from: span.from, to: span.to, insert: clean === '' && isLast ? '' : insert };
  }
  if (clean === '') return { from: line.to, to: line.to, insert: '' };
  const kept = line.from + text.slice(line.from, line.to).trimEnd().length;
  const bars = ' |'.repeat(place - fields.length + 1);
  return { from: kept, to: line.to, insert: `${bars} ${clean}${line.comment === null ? '' : '  '}` };
}

/** The text with one field changed. */
export function withRowField(text: string, row: number, field: TableField, value: string): string {
  const change = setRowField(text, row, field, value);
  return change ? applyChanges(text, [change]) : text;
}

/** The change that writes a new row after the row-th one (from 0), or at the end for a row that is not there. */
export function addRow(text: string, row: number, fields: Partial<Record<TableField, string>>): TextChange {
  const cells = tableFields.map((field) => cleanField(field, fields[field] ?? ''));
  while (cells.length > 1 && cells.at(-1) === '') cells.pop();
  const written = cells.join(' | ');
  const at = rowLines(text)[row];
  const end = at ? endOfLine(at) : text.length;
  const begins = end === 0 || text[end - 1] === '\n';
  return { from: end, to: end, insert: `${begins ? '' : '\n'}${written}${begins ? '\n' : ''}` };
}

/** The change that takes the row-th row (from 0) out with its comment; null where there is no such row. */
export function removeRow(text: string, row: number): TextChange | null {
  const line = rowLines(text)[row];
  if (!line) return null;
  const end = endOfLine(line);
  const newline = /^\r?\n|^\r/.exec(text.slice(end))?.[0].length ?? 0;
  return { from: line.from, to: end + newline, insert: '' };
}

function rowLines(text: string): LogicalLine[] {
  return logicalLines(text).filter((line) => {
    const scanner = new Scanner(text, line.from, line.to, 'expression');
    if (scanner.has('end')) return false;
    return !(scanner.has('name') && isStatementWord(scanner.word));
  });
}

function fieldsOf(line: LogicalLine): { from: number; to: number }[] {
  const [first = line.to, second = line.to] = line.bars;
  const fields = [{ from: line.from, to: first }];
  if (line.bars.length > 0) fields.push({ from: first + 1, to: second });
  if (line.bars.length > 1) fields.push({ from: second + 1, to: line.to });
  return fields;
}

/** Where a line ends, behind its comment. */
function endOfLine(line: LogicalLine): number {
  return line.comment === null ? line.to : line.to + 1 + line.comment.length;
}

function cleanField(field: TableField, value: string): string {
  const ends = field === 'note' ? /[#\r\n]|\\$/g : /[|#\r\n\\]/g;
  return value.replace(ends, ' ').replace(/\s+/g, ' ').trim();
}
