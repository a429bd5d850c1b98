import { afterContinuation, afterNewline, isBlank } from './tokens.ts';

const HASH = 35;
const BAR = 124;

/** Most lines of a long text have none. */
const noBars: readonly number[] = [];

/** A line of the text with those that its `\` joins to it. Offsets into the text; `to` is before the comment. */
export interface LogicalLine {
  /** 1-based number of its first line. */
  readonly line: number;
  readonly from: number;
  readonly to: number;
  /** The `|` signs before the comment. */
  readonly bars: readonly number[];
  /** The text after `#`, or null where there is none. */
  readonly comment: string | null;
}

/** Splits a text into logical lines. A text that ends in a newline has no empty line after it. */
export function logicalLines(text: string): LogicalLine[] {
  const lines: LogicalLine[] = [];
  let line = 1;
  let at = 0;
  while (at < text.length) {
    const first = line;
    const from = at;
    let bars: number[] | null = null;
    let comment: number | null = null;
    for (;;) {
      const next = afterNewline(text, at);
      if (at >= text.length || next >= 0) {
        const to = comment ?? at;
        const rest = comment === null ? null : text.slice(comment + 1, at);
        lines.push({ line: first, from, to, bars: bars ?? noBars, comment: rest });
        at = next >= 0 ? next : at;
        line += 1;
        break;
      }
      const code = text.charCodeAt(at);
      const continued = comment === null ? afterContinuation(text, at) : -1;
      if (continued >= 0) {
        at = continued;
        line += 1;
        continue;
      }
      if (comment === null && code === HASH) comment = at;
      if (comment === null && code === BAR) (bars ??= []).push(at);
      at += 1;
    }
  }
  return lines;
}

/** What is written in a stretch, joined over `\` and without blanks at its ends. */
export function plainText(text: string, from: number, to: number): string {
  let result = '';
  let start = from;
  for (let at = from; at < to; at += 1) {
    const next = afterContinuation(text, at);
    if (next < 0) continue;
    result += `${text.slice(start, at).trimEnd()} `;
    at = next;
    while (at < to && isBlank(text.charCodeAt(at))) at += 1;
    start = at;
    at -= 1;
  }
  return (result + text.slice(Math.min(start, to), to)).trim();
}
