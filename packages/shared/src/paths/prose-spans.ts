import { parseWoven, type Woven } from './woven.ts';
import type { Reading } from './reading.ts';

/** Mathematics in prose: `$…$` in the line, `$$…$$` displayed. */
export interface MathSpan {
  readonly tex: string;
  readonly display: boolean;
  readonly to: number;
}

/** A woven value in prose; `from` and `to` are the offsets of `=[` and after `]`. */
export interface WovenSpan {
  readonly source: string;
  readonly woven: Reading<Woven>;
  readonly from: number;
  readonly to: number;
}

/** How far a piece may reach, in UTF-16 units: without bounds, unclosed signs would cost the square of the text. */
const longest = { display: 10_000, math: 1500, woven: 400, code: 2000 } as const;

/**
 * The mathematics that begins at `at`, or null. `$` opens where no blank follows and closes where no blank precedes and
 * no digit follows, so that "$5 and $6" stays text; a paragraph's end ends the search.
 */
export function mathAt(text: string, at: number): MathSpan | null {
  if (text[at] !== '$') return null;
  const display = text[at + 1] === '$';
  const reach = display ? longest.display : longest.math;
  const limit = at + (/\n[ \t]*\n/u.exec(text.slice(at, at + reach))?.index ?? reach);
  if (display) {
    const close = text.indexOf('$$', at + 2);
    const tex = close === -1 || close >= limit ? '' : text.slice(at + 2, close).trim();
    return tex === '' ? null : { tex, display: true, to: close + 2 };
  }
  if (/\s/u.test(text[at + 1] ?? ' ')) return null;
  for (let close = at + 1; close < Math.min(limit, text.length); close++) {
    if (text[close] === '\\') close++;
    else if (text[close] === '$') {
      if (/\s/u.test(text[close - 1] ?? ' ') || /\d/u.test(text[close + 1] ?? '')) continue;
      return close === at + 1 ? null : { tex: text.slice(at + 1, close), display: false, to: close + 1 };
    }
  }
  return null;
}

/** The woven value that begins at `at`, or null where `=[` is not followed by a name and, in the same line, by `]`. */
export function wovenAt(text: string, at: number): WovenSpan | null {
  if (text[at] !== '=' || text[at + 1] !== '[' || !/[\p{L}_ ]/u.test(text[at + 2] ?? '')) return null;
  let depth = 0;
  const limit = Math.min(text.length, at + longest.woven);
  for (let i = at + 1; i < limit && text[i] !== '\n'; i++) {
    if (text[i] === '"') {
      const close = /"(?:[^"\\\n]|\\.)*"/uy;
      close.lastIndex = i;
      i = close.test(text) ? close.lastIndex - 1 : i;
    } else if (text[i] === '[') depth++;
    else if (text[i] === ']' && --depth === 0) {
      const source = text.slice(at + 2, i);
      return source.trim() === '' ? null : { source, woven: parseWoven(source), from: at, to: i + 1 };
    }
  }
  return null;
}

/** Where an inline piece, or a new line, may begin. */
const special = /[\\`$=]|(?<=\n)/gu;
const fence = /^ {0,3}(`{3,}|~{3,})/u;

/** All woven values of a prose text, outside code and mathematics. */
export function findWoven(text: string): WovenSpan[] {
  const found: WovenSpan[] = [];
  let open: string | null = null;
  let at = 0;
  while (at < text.length) {
    const lineStart = at === 0 || text[at - 1] === '\n';
    if (lineStart) {
      const end = text.indexOf('\n', at);
      const line = text.slice(at, end === -1 ? undefined : end);
      const mark = fence.exec(line)?.[1];
      const closes = open !== null && mark?.startsWith(open) === true;
      if (closes || open !== null || mark !== undefined) {
        if (closes) open = null;
        else if (open === null && mark !== undefined) open = mark;
        at += line.length + 1;
        continue;
      }
    }
    at = inlineStep(text, at, found);
  }
  return found;
}

/** Takes one inline piece at `at`, noting a woven value, and returns where the next piece begins. */
function inlineStep(text: string, at: number, found: WovenSpan[]): number {
  switch (text[at]) {
    case '\\':
      return at + 2;
    case '`': {
      const ticks = /`+/uy;
      ticks.lastIndex = at;
      const run = ticks.exec(text)?.[0] ?? '`';
      const begin = at + run.length;
      const close = new RegExp(`(?<!\`)${run}(?!\`)`, 'u').exec(text.slice(begin, begin + longest.code));
      return close === null ? begin : begin + close.index + run.length;
    }
    case '$':
      return mathAt(text, at)?.to ?? at + 1;
    case '=': {
      const span = wovenAt(text, at);
      if (span === null) return at + 1;
      found.push(span);
      return span.to;
    }
    default: {
      special.lastIndex = at + 1;
      return special.exec(text)?.index ?? text.length;
    }
  }
}
