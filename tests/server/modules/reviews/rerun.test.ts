import type { CellJob, CellOutcome } from '@stillroom/shared/cells';
import { digestOf, engineVersion } from '@stillroom/shared/plan';
import { describe, expect, test } from 'vitest';
import type { Pool } from '../../../../packages/server/src/modules/compute/index.ts';
import type { RecordCell } from '../../../../packages/server/src/modules/records/index.ts';
import { type Comparison, rerunRecord } from '../../../../packages/server/src/modules/reviews/jobs/rerun.ts';
import { cell } from '../../../support/cells.ts';

/** What the pool of these tests computes: what a cell is made of. */
const resultOf = (job: CellJob) => ({
  kind: job.kind,
  from: Object.fromEntries(Object.entries(job.inputs).map(([name, { result = null }]) => [name, result])),
});
const outcomeOf = (job: CellJob): CellOutcome => {
  const result = resultOf(job);
  return { status: 'ok', result, resultDigest: digestOf(result), warnings: [], keep: true };
};

function build(outcome: (job: CellJob) => CellOutcome = outcomeOf) {
  const ran: string[] = [];
  const pool = {
    run: async (job: CellJob) => {
      ran.push(job.kind);
      return outcome(job);
    },
  } as unknown as Pool;
  const told: [string, Comparison['outcome']][] = [];
  const why = new Map<string, string>();
  const rerun = (
    cells: readonly RecordCell[],
    asked = cells.map(({ id }) => id),
    signal = new AbortController().signal,
    engine = engineVersion,
  ) =>
    rerunRecord({
      pool,
      cells,
      engine,
      asked: new Set(asked),
      owner: 'g',
      part: 'r',
      signal,
      tell: async (id, comparison) => {
        told.push([id, comparison.outcome]);
        if (comparison.why !== null) why.set(id, comparison.why);
      },
    });
  return { rerun, ran, told, why };
}

const frozen = (
  id: string,
  kind: RecordCell['kind'],
  text: string,
  result: unknown,
  settings = {},
): RecordCell => ({
  ...cell(id, kind as 'network', text, { settings }),
  draws: [],
  state: 'current',
  digest: 'sha256:d',
  resultDigest: digestOf(result),
  result,
  error: null,
  warnings: [],
});
const network = { kind: 'network', from: {} };
const record = () => [
  frozen('ends', 'claim', 'run.times == 1', {
    kind: 'claim',
    from: { run: { kind: 'trajectory', from: { yeast: null } } },
  }),
  frozen('yeast', 'network', 'A -> B', network),
  frozen(
    'run',
    'trajectory',
    '',
    { kind: 'trajectory', from: { yeast: null } },
    { network: 'yeast', until: 1 },
  ),
];
const last = (told: readonly [string, string][]) => Object.fromEntries(told);

describe('a rerun', () => {
  test('computes each cell after what it draws on, from fresh results', async () => {
    const { rerun, ran, told } = build();
    await rerun(record());
    expect(ran).toEqual(['network', 'trajectory', 'claim']);
    expect(last(told)).toEqual({ yeast: 'matches', run: 'matches', ends: 'matches' });
  });

  test('of one cell also computes what its result stands on, and compares that cell alone', async () => {
    const { rerun, ran, told } = build();
    await rerun(record(), ['ends']);
    expect(ran).toEqual(['trajectory', 'claim']);
    expect(told).toEqual([
      ['ends', 'working'],
      ['ends', 'matches'],
    ]);
  });

  test('tells a difference, and a cell that draws on it differs too', async () => {
    const { rerun, told } = build((job) => {
      if (job.kind !== 'trajectory') return outcomeOf(job);
      return { status: 'ok', result: 1, resultDigest: digestOf(1), warnings: [], keep: true };
    });
    await rerun(record());
    expect(last(told)).toEqual({ yeast: 'matches', run: 'differs', ends: 'differs' });
  });

  test('tells a failure with its reason, and goes on', async () => {
    const { rerun, told } = build((job) =>
      job.kind === 'network'
        ? { status: 'failed', error: { message: 'No.' }, warnings: [], keep: true }
        : outcomeOf(job),
    );
    await rerun(record());
    expect(last(told)).toEqual({ yeast: 'failed', run: 'matches', ends: 'matches' });
  });

  test('by another engine says so of what differs, and runs under the digests of the record', async () => {
    const digests: string[] = [];
    const drawn: (string | null)[] = [];
    const recorded = record().map((cell) => ({ ...cell, digest: `sha256:of ${cell.id}` }));
    const { rerun, told, why } = build((job) => {
      digests.push(job.digest);
      drawn.push(...Object.values(job.inputs).map(({ digest }) => digest));
      return job.kind === 'trajectory'
        ? { status: 'ok', result: 1, resultDigest: digestOf(1), warnings: [], keep: true }
        : outcomeOf(job);
    });
    await rerun(recorded, ['yeast', 'run'], undefined, '0.0.7');
    expect(last(told)).toEqual({ yeast: 'matches', run: 'differs' });
    expect(why.get('run')).toBe(
      'The fresh result is not the one in the record. ' +
        `The record was made by engine 0.0.7, this rerun by engine ${engineVersion}.`,
    );
    // Of the cells and of what they draw on: they seed scripts and stand in prose.
    expect(digests).toEqual(['sha256:of yeast', 'sha256:of run']);
    expect(drawn).toEqual(['sha256:of yeast']);
    await rerun(recorded, ['yeast', 'run']);
    expect(why.get('run')).toBe('The fresh result is not the one in the record.');
  });

  test('that is ended between two cells tells nothing more', async () => {
    const controller = new AbortController();
    const { rerun, told } = build((job) => {
      controller.abort();
      return outcomeOf(job);
    });
    await rerun(record(), undefined, controller.signal);
    expect(told).toEqual([['yeast', 'working']]);
  });
});
