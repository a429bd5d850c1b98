import type { RerunView } from '@stillroom/shared/contracts';

export interface OutcomeLook {
  /** Suffix of the seam's line style and colours. */
  readonly line: 'matches' | 'differs' | 'failed' | 'working' | 'unrun';
  readonly glyph: 'matches' | 'differs' | 'failed' | 'working' | 'unrun';
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
