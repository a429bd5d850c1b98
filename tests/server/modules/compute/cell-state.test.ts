import type { CellContent } from '@stillroom/shared/document';
import { planNotebook } from '@stillroom/shared/plan';
import { describe, expect, test } from 'vitest';
import { type CellFacts, noticeOf } from '../../../../packages/server/src/modules/compute/cell-state.ts';
import type { Known } from '../../../../packages/server/src/modules/compute/results.ts';
import { cell } from '../../../support/cells.ts';

const cells = [cell('yeast', 'network', 'A -> B'), cell('ends', 'claim', 'yeast.species == 1')];

function say(id: string, facts: Partial<CellFacts> & { held?: CellContent['held'] } = {}) {
  const plan = planNotebook(cells);
  const content = cells.find((found) => found.id === id);
  const planned = plan.byId.get(id);
  if (content === undefined || planned === undefined) throw new Error(`There is no cell ${id}.`);
  const { held = null, ...rest } = facts;
  const usual = { known: undefined, run: undefined, preparation: undefined, shown: null };
  return noticeOf({ content: { ...content, held }, planned, ...usual, ...rest }, plan);
}
const digest = planNotebook(cells).byId.get('yeast')?.digest ?? '';
const ok: Known = {
  status: 'ok',
  digest,
  kind: 'network',
  warnings: [],
  took: 12.34,
  kept: true,
  json: '{}',
  resultDigest: 'sha256:r',
};
const failed: Known = { ...ok, status: 'failed', error: { message: 'No.', line: 1 }, json: null };
const held = { by: 'ada', at: '2026-12-01T09:00:00Z' };

describe('what is said of a cell', () => {
  test('known: current, with the time it took', () => {
    expect(say('yeast', { known: ok, shown: digest })).toMatchObject({
      state: 'current',
      shown: digest,
      took: 12.3,
    });
  });

  test('failed: why, and the last good result stays shown', () => {
    expect(say('yeast', { known: failed, shown: 'sha256:old' })).toMatchObject({
      state: 'failed',
      error: { message: 'No.', line: 1 },
      shown: 'sha256:old',
    });
  });

  test('queued and running: working, with words or the time it began and the share done', () => {
    const run = { since: null, share: null, words: null };
    expect(say('yeast', { run })).toMatchObject({ state: 'working', words: 'waits for its turn' });
    const since = '2026-12-01T10:00:00Z';
    expect(say('yeast', { run: { since, share: 0.5, words: 'pass 2' } })).toMatchObject({
      state: 'working',
      since,
      progress: 0.5,
      words: 'pass 2',
    });
  });

  test('not computed yet: stale, and for what it waits', () => {
    expect(say('yeast')).toMatchObject({ state: 'stale' });
    const preparation = { state: 'waiting', on: ['yeast'] } as const;
    expect(say('ends', { preparation })).toMatchObject({ state: 'stale', words: 'waits for yeast' });
  });

  test('held: by whom and since when, current or not', () => {
    expect(say('yeast', { held })).toMatchObject({ state: 'held', heldBy: 'ada', since: held.at });
    expect(say('yeast', { held, known: ok })).toMatchObject({ state: 'held', heldBy: 'ada' });
  });

  test('prose is never stale: it is set, or it cannot be set', () => {
    const plan = planNotebook([cell('intro', 'prose', 'Words')]);
    const planned = plan.byId.get('intro');
    if (planned === undefined) throw new Error('There is no prose.');
    const facts = {
      content: cell('intro', 'prose', 'Words'),
      planned,
      run: undefined,
      preparation: undefined,
      shown: null,
    };
    expect(noticeOf({ ...facts, known: undefined }, plan).state).toBe('current');
    expect(noticeOf({ ...facts, known: failed }, plan).state).toBe('failed');
  });
});
