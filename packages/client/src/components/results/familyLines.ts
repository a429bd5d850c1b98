import { parseNetwork, type RowSyntax, type SideSyntax } from '@stillroom/shared/notation';
import type { Sides } from './shapes.ts';

/** One arrow of a row as it is written, indices and all: what a family stands for, not each of its reactions. */
export interface WrittenArrow {
  /** 0-based row of the text. */
  readonly row: number;
  readonly from: Sides;
  readonly to: Sides;
  readonly both: boolean;
  /** Constants or laws as written, there and back; null where the text gives none. */
  readonly rates: readonly [there: string | null, back: string | null];
  /** Over which indices it runs: "i = 1 … L"; null for a row that is no family. */
  readonly over: string | null;
}

function sidesOf(text: string, side: SideSyntax | undefined): Sides {
  return Object.fromEntries(
    (side?.terms ?? []).map(({ species, numerator, denominator }) => [
      text.slice(species.from, species.to).replaceAll(/\s*([,+\-*/%])\s*/gu, '$1'),
      numerator / denominator,
    ]),
  );
}

/** The constants of a row in the order in which its arrows take them. */
function ratesOf(text: string, row: RowSyntax): readonly string[] {
  return row.items.map((item) => {
    const span = item.kind === 'constant' ? item.name : item.value;
    return text.slice(span.from, span.to);
  });
}

function arrowsOf(text: string, row: RowSyntax, index: number): readonly WrittenArrow[] {
  const rates = ratesOf(text, row);
  const isNet = row.items.some(({ kind }) => kind === 'net');
  const inside =
    row.family === null ? null : text.slice(row.family.from, row.family.to).replace(/^\[|\]$/gu, '');
  let taken = 0;
  const take = () => rates[taken++] ?? null;
  return row.arrows.map(({ sign }, i): WrittenArrow => {
    const sides = [sidesOf(text, row.sides[i]), sidesOf(text, row.sides[i + 1])] as const;
    const [from, to] = sign === '<-' ? [sides[1], sides[0]] : sides;
    const there = take();
    const back = sign === '<=>' && !isNet ? take() : null;
    const over = inside?.replaceAll('..', ' … ').trim() ?? null;
    return { row: index, from, to, both: sign === '<=>', rates: [there, back], over };
  });
}

/** Every arrow of a text as it is written, row by row. */
export function writtenArrows(text: string): readonly WrittenArrow[] {
  const rows = parseNetwork(text).tree.lines.filter((line): line is RowSyntax => line.kind === 'row');
  return rows.flatMap((row, index) => arrowsOf(text, row, index));
}
