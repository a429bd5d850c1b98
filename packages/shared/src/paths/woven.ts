import { type Path, readPathAt } from './path.ts';
import { MisreadError, type Reading, reading } from './reading.ts';

/** What is done with a value before it is set in a sentence, in order of writing. */
export type WovenFilter =
  | { readonly kind: 'first' | 'last' | 'mean' | 'sd' | 'min' | 'max' | 'scientific' | 'percent' | 'unit' }
  | { readonly kind: 'at'; readonly time: number }
  | { readonly kind: 'digits' | 'decimals'; readonly count: number };

/** A value woven into prose: `=[run1.species.P, last, 3 digits]`. */
export interface Woven {
  readonly path: Path;
  readonly filters: readonly WovenFilter[];
}

const plainFilters = ['first', 'last', 'mean', 'sd', 'min', 'max', 'scientific', 'percent', 'unit'] as const;
const allFilters = 'first, last, at T, mean, sd, min, max, N digits, N decimals, scientific, percent, unit';
const mostDigits = { digits: 17, decimals: 20 } as const;

function readFilter(text: string, at: number): WovenFilter {
  const plain = plainFilters.find((known) => known === text);
  if (plain !== undefined) return { kind: plain };
  const time = /^at\s+([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)$/u.exec(text);
  if (time !== null) return { kind: 'at', time: Number(time[1]) };
  const counted = /^(\d{1,3})\s+(digit|decimal)s?$/u.exec(text);
  if (counted !== null) {
    const kind = counted[2] === 'digit' ? 'digits' : 'decimals';
    const count = Number(counted[1]);
    if (count > mostDigits[kind] || (kind === 'digits' && count === 0)) {
      throw new MisreadError(
        `${count} ${kind} cannot be shown.`,
        at,
        `Between 1 and ${mostDigits[kind]} can.`,
      );
    }
    return { kind, count };
  }
  throw new MisreadError(`"${text}" is no way to show a value.`, at, `There are ${allFilters}.`);
}

/** Reads what stands between `=[` and `]`; offsets of the path and of a misreading count within `text`. */
export function parseWoven(text: string): Reading<Woven> {
  return reading(() => {
    const path = readPathAt(text, text.length - text.trimStart().length);
    const filters: WovenFilter[] = [];
    let at = path.to;
    while (text.slice(at).trim() !== '') {
      at += text.slice(at).length - text.slice(at).trimStart().length;
      if (text[at] !== ',') {
        throw new MisreadError('A comma is expected between a path and the way to show it.', at);
      }
      const end = text.indexOf(',', at + 1);
      const part = text.slice(at + 1, end === -1 ? undefined : end);
      filters.push(readFilter(part.trim().replace(/\s+/gu, ' '), at + 1));
      at = end === -1 ? text.length : end;
    }
    return { path, filters };
  });
}
