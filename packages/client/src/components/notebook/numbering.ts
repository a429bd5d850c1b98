import type { CellContent } from '@stillroom/shared/document';
import type { CellKind } from '@stillroom/shared/cells';

/** Word of the series a kind is numbered in; kinds without one bear no number. */
const series: Partial<Record<CellKind, string>> = {
  network: 'Scheme',
  structure: 'Structure',
  balance: 'Balance',
  trajectory: 'Figure',
  plot: 'Figure',
  claim: 'Claim',
};

/** "Scheme 1", "Figure 2" … by cell id, in document order. */
export function numberCells(cells: readonly Pick<CellContent, 'id' | 'kind'>[]): ReadonlyMap<string, string> {
  const counts = new Map<string, number>();
  const numbers = new Map<string, string>();
  for (const { id, kind } of cells) {
    const word = series[kind];
    if (word === undefined) continue;
    const count = (counts.get(word) ?? 0) + 1;
    counts.set(word, count);
    numbers.set(id, `${word} ${count}`);
  }
  return numbers;
}

/** The first Markdown heading of a prose text, or its first words. */
export function headingOf(text: string): string {
  const heading = /^\s{0,3}#{1,6}\s+(.+?)\s*#*\s*$/mu.exec(text)?.[1];
  if (heading !== undefined) return heading.replaceAll(/[*_`]/gu, '');
  const first = text
    .split('\n')
    .find((line) => line.trim() !== '')
    ?.trim();
  if (first === undefined) return 'Empty prose';
  return first.length > 40 ? `${first.slice(0, 38).trimEnd()}…` : first;
}
