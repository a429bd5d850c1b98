import { widthOf, WIDEST } from '../columns.ts';
import { logicalLines } from '../lines.ts';
import type { LogicalLine } from '../lines.ts';
import type { TextChange } from './change.ts';

/**
 * The changes that align the `|` signs of a text as it is being typed: blanks just before a bar are added or taken away,
 * nothing else, so that a caret stays with what it stands in. Lines of one block (between blank lines) are aligned with
 * each other. `at`: only the block around this offset, which is all that a key stroke can have changed.
 */
export function alignColumns(text: string, at?: number): TextChange[] {
  const block = at === undefined ? { from: 0, to: text.length } : blockAround(text, at);
  const changes: TextChange[] = [];
  for (const lines of blocksOf(text.slice(block.from, block.to))) {
    for (const change of alignBlock(lines.text, lines.lines)) {
      changes.push({ ...change, from: change.from + block.from, to: change.to + block.from });
    }
  }
  return changes;
}

/** The stretch between the blank lines before and after an offset. */
function blockAround(text: string, at: number): { from: number; to: number } {
  const blank = /(?:^|\n)[^\S\n]*\r?(?=\n)/g;
  let from = 0;
  let to = text.length;
  for (let match = blank.exec(text); match; match = blank.exec(text)) {
    const end = match.index + match[0].length;
    if (end < at) from = end;
    else if (match.index >= at) {
      to = match.index;
      break;
    }
    if (match[0] === '') blank.lastIndex += 1;
  }
  return { from, to };
}

function blocksOf(text: string): { text: string; lines: LogicalLine[] }[] {
  const blocks: { text: string; lines: LogicalLine[] }[] = [];
  let lines: LogicalLine[] = [];
  for (const line of logicalLines(text)) {
    const isBlank = line.comment === null && text.slice(line.from, line.to).trim() === '';
    if (!isBlank) lines.push(line);
    else if (lines.length > 0) {
      blocks.push({ text, lines });
      lines = [];
    }
  }
  return lines.length > 0 ? [...blocks, { text, lines }] : blocks;
}

function alignBlock(text: string, lines: readonly LogicalLine[]): TextChange[] {
  const rows = lines
    .filter((line) => line.bars.length > 0 && !/[\r\n]/.test(text.slice(line.from, line.to)))
    .map((line) => cellsOf(text, line));
  const widths: number[] = [];
  for (const cells of rows) {
    cells.forEach(({ width }, c) => {
      // The blank after a bar is none of the cell's own letters.
      const letters = c > 0 ? width - 1 : width;
      if (letters <= WIDEST) widths[c] = Math.max(widths[c] ?? 0, width);
    });
  }
  return rows.flatMap((cells) => cells.flatMap((cell, c) => alignCell(cell, widths[c] ?? 0)));
}

interface Cell {
  /** Where the bar after the cell stands. */
  readonly bar: number;
  /** Of the cell without the blanks at its end. */
  readonly width: number;
  readonly blanks: number;
}

/** The first two cells of a row: later bars belong to the note. */
function cellsOf(text: string, line: LogicalLine): Cell[] {
  let from = line.from;
  return line.bars.slice(0, 2).map((bar, c) => {
    const written = text.slice(from, bar);
    // The blank after a bar belongs to the cell, also where the cell is empty.
    const kept = written.trimEnd() || (c > 0 ? ' ' : '');
    from = bar + 1;
    return { bar, width: widthOf(kept), blanks: written.length - kept.length };
  });
}

function alignCell({ bar, width, blanks }: Cell, widest: number): TextChange[] {
  const wanted = Math.max(1, widest - width + 1);
  if (blanks === wanted) return [];
  if (blanks < wanted) return [{ from: bar, to: bar, insert: ' '.repeat(wanted - blanks) }];
  return [{ from: bar - (blanks - wanted), to: bar, insert: '' }];
}
