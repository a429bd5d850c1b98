import { type CellKind, isCellKind } from '@stillroom/shared/cells';
import type { FairCell } from '@stillroom/shared/contracts';
import { citedWorks } from '../results/citedName.ts';
import { numberCells } from './numbering.ts';

/** A line of a fair copy's contents: a heading of prose, or a number with the cell's name. */
export interface ContentsLine {
  readonly id: string;
  readonly words: string;
  readonly name: string;
}

const known = (cells: readonly FairCell[]) =>
  cells.flatMap((cell) => (isCellKind(cell.kind) ? [{ ...cell, kind: cell.kind as CellKind }] : []));

/** "Scheme 1" by id, and by name for references in prose, with the works that prose cites. */
export function fairNumbers(cells: readonly FairCell[]): {
  byId: ReadonlyMap<string, string>;
  byName: ReadonlyMap<string, string>;
} {
  const byId = numberCells(known(cells));
  const byName = new Map(
    cells
      .flatMap(({ id, name }) => {
        const number = byId.get(id);
        return name === '' || number === undefined ? [] : [[name, number] as const];
      })
      .concat(citedWorks(cells)),
  );
  return { byId, byName };
}

const headings = (text: string) =>
  [...text.matchAll(/^#{1,3}\s+(.+?)\s*#*$/gmu)].map(([, words = '']) => words.replaceAll(/[*_`]/gu, ''));

/** Contents of a fair copy in order; scripts and unnamed kinds go by their name. */
export function fairContents(
  cells: readonly FairCell[],
  numbers: ReadonlyMap<string, string>,
): readonly ContentsLine[] {
  return cells.flatMap(({ id, kind, name, text }): ContentsLine[] => {
    if (kind === 'prose')
      return headings(text)
        .slice(0, 1)
        .map((words) => ({ id, words, name: '' }));
    const number = numbers.get(id);
    return number === undefined ? [] : [{ id, words: number, name }];
  });
}

/** "A, B and C". */
export const listed = (names: readonly string[]): string =>
  names.length < 2 ? (names[0] ?? '') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;

const cautions: Readonly<Record<string, string>> = {
  clinical: 'These are model calculations: not for dosing or diagnosis without qualified review.',
  'public health':
    'These are model calculations: not for outbreak control decisions without qualified review.',
  'process safety':
    'These are model calculations: not for process safety decisions without qualified review; local codes and licensed practice come first.',
  environment: 'These are model calculations: not for environmental decisions without qualified review.',
};

/** The caution a notebook of this subject carries; null for none. */
export const cautionOf = (subject: string): string | null => cautions[subject] ?? null;
