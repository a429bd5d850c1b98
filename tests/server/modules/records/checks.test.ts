import type { CellContent } from '@stillroom/shared/document';
import type { CellNotice } from '@stillroom/shared/protocol';
import { planNotebook } from '@stillroom/shared/plan';
import { describe, expect, test } from 'vitest';
import type { Known, StandingCell } from '../../../../packages/server/src/modules/compute/index.ts';
import { freezeView } from '../../../../packages/server/src/modules/records/checks.ts';
import { cell } from '../../../support/cells.ts';

/** A cell that stands well; what is said takes its place. */
function standing(content: CellContent, rest: Partial<StandingCell> = {}): StandingCell {
  const planned = planNotebook([content]).cells[0];
  if (planned === undefined) throw new Error('There is no cell.');
  const notice: CellNotice = {
    id: content.id,
    state: 'current',
    digest: 'sha256:d',
    shown: 'sha256:d',
    draws: [],
  };
  return { content, planned, notice, known: known('{}'), working: false, waitsFor: [], ...rest };
}
const known = (json: string, rest: Partial<Known> = {}): Known =>
  ({
    status: 'ok',
    digest: 'sha256:d',
    kind: 'network',
    warnings: [],
    took: 1,
    kept: true,
    json,
    resultDigest: 'sha256:r',
    ...rest,
  }) as Known;
const network = (id = 'yeast') => cell(id, 'network', 'A -> B');
const notice = (state: CellNotice['state'], rest: Partial<CellNotice> = {}): CellNotice => ({
  id: 'yeast',
  state,
  digest: null,
  shown: null,
  draws: [],
  ...rest,
});

const check = (cells: readonly StandingCell[], remarks: { cell: string; text: string }[] = []) => {
  const { checks, working } = freezeView(cells, remarks, 1);
  const open = checks.filter(({ state }) => state !== 'met').map(({ id, state }) => `${id}: ${state}`);
  return {
    open,
    working,
    named: checks.flatMap(({ cells: named }) => named.map(({ name, why }) => `${name}: ${why}`)),
  };
};

describe('the check before freezing', () => {
  test('is met by current cells', () => {
    expect(check([standing(network())])).toEqual({ open: [], working: 0, named: [] });
  });

  test('is blocked by an empty notebook', () => {
    expect(check([]).open).toEqual(['content: blocking']);
  });

  test('is blocked by failed cells, with the reason', () => {
    const failed = notice('failed', { error: { message: 'No such species.' } });
    const { open, named } = check([standing(network(), { notice: failed, known: undefined })]);
    expect(open).toEqual(['failed: blocking']);
    expect(named).toEqual(['yeast: No such species.']);
  });

  test('is blocked by stale cells, and by held ones that are held at something older', () => {
    const stale = standing(network(), { notice: notice('stale'), known: undefined });
    const held = { ...network('old'), held: { by: 'ada', at: 'then' } };
    const { open, named } = check([stale, standing(held, { notice: notice('held'), known: undefined })]);
    expect(open).toEqual(['stale: blocking']);
    expect(named).toEqual([
      'yeast: It has changed since it was last computed.',
      'old: It is held at an older result.',
    ]);
  });

  test('is met by a cell that is held at its present result', () => {
    const held = { ...network(), held: { by: 'ada', at: 'then' } };
    expect(check([standing(held, { notice: notice('held') })]).open).toEqual([]);
  });

  test('is blocked by a result that stands on a run which was ended', () => {
    expect(check([standing(network(), { known: known('{}', { kept: false }) })]).open).toEqual([
      'stale: blocking',
    ]);
  });

  test('waits for working cells and for what waits for them, at any distance', () => {
    const working = standing(network(), { notice: notice('working'), known: undefined, working: true });
    const next = standing(network('next'), {
      notice: notice('stale'),
      known: undefined,
      waitsFor: ['yeast'],
    });
    const last = standing(network('last'), { notice: notice('stale'), known: undefined, waitsFor: ['next'] });
    expect(check([last, next, working])).toEqual({ open: [], working: 3, named: [] });
  });

  test('leaves failing and undecided claims and open remarks open, for a reason', () => {
    const claim = (id: string, verdict: string) =>
      standing(cell(id, 'claim', '1 == 1'), { known: known(JSON.stringify({ verdict })) });
    const { open, named } = check(
      [claim('good', 'holds'), claim('bad', 'fails'), claim('unknown', 'undecided')],
      [{ cell: 'good', text: 'Really?' }],
    );
    expect(open).toEqual(['claims: open', 'remarks: open']);
    expect(named).toEqual(['bad: fails', 'unknown: undecided', 'good: Really?']);
  });
});
