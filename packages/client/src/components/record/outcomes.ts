import type { RerunView } from '@stillroom/shared/contracts';

export interface OutcomeLook {
  /** Suffix of the seam's line style and colours. */
  readonly line: 'matches' | 'differs' | 'failed' | 'working' | 'unrun' | 'current';
  readonly glyph: 'matches' | 'differs' | 'failed' | 'working' | 'unrun' | 'frozen';
  readonly words: string;
}

const looks: Readonly<Record<string, OutcomeLook>> = {
  matches: { line: 'matches', glyph: 'matches', words: 'matches' },
  differs: { line: 'differs', glyph: 'differs', words: 'differs' },
  failed: { line: 'failed', glyph: 'failed', words: 'failed' },
  working: { line: 'working', glyph: 'working', words: 'working' },
  waiting: { line: 'unrun', glyph: 'unrun', words: 'waits' },
};
const notRerun: OutcomeLook = { line: 'unrun', glyph: 'unrun', words: 'not rerun' };

/** How a cell of a record shows its rerun; without one it is "not rerun", never blank. */
export const outcomeOf = (run: RerunView['cells'][string] | null | undefined): OutcomeLook =>
  (run === null || run === undefined ? undefined : looks[run.outcome]) ?? notRerun;

const asFrozen: OutcomeLook = { line: 'current', glyph: 'frozen', words: 'frozen' };

/** How a cell shows in a record: compared where the page reruns (null: not begun), as frozen where it does not. */
export const outcomeIn = (rerun: RerunView | null | undefined, cell: string): OutcomeLook =>
  rerun === undefined ? asFrozen : outcomeOf(rerun?.cells[cell]);

/** "4 match, 1 differs, 2 not rerun": how many of a record's computed cells fared how. */
export function outcomesInWords(outcomes: readonly OutcomeLook[]): string {
  const counts = new Map<string, number>();
  for (const { words } of outcomes) counts.set(words, (counts.get(words) ?? 0) + 1);
  const plural: Readonly<Record<string, string>> = { matches: 'match', differs: 'differ', waits: 'wait' };
  return [...counts]
    .map(([words, count]) => `${count} ${count === 1 ? words : (plural[words] ?? words)}`)
    .join(', ');
}
