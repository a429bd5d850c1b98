import type { CellJob } from '@stillroom/shared/cells';
import { expect, test } from 'vitest';
import type { Known } from '../../../../packages/server/src/modules/compute/results.ts';
import { Trials } from '../../../../packages/server/src/modules/compute/trials.ts';

const digest = 'sha256:a';
const job = { digest } as CellJob;
const owner = { group: 'g', notebook: 'n', name: 'a trial' };
const known: Known = {
  digest,
  kind: 'trajectory',
  warnings: [],
  took: 1,
  kept: true,
  json: '1',
  status: 'ok',
  resultDigest: 'sha256:1',
};

function setUp() {
  const said: string[] = [];
  const store = new Map<string, Known>();
  const trials = new Trials({
    results: { find: async () => new Map(store) },
    demand: {
      want: () => void said.push('wanted'),
      settle: () => void said.push('settled'),
      release: () => void said.push('released'),
    },
    submit: async () => void said.push('submitted'),
  });
  return { trials, said, store };
}

test('what is known already is not run again', async () => {
  const { trials, said, store } = setUp();
  store.set(digest, known);
  expect(await trials.run(job, owner, new AbortController().signal)).toBe(known);
  expect(said).toEqual([]);
});

test('a run is waited for until something is known under its digest', async () => {
  const { trials, said, store } = setUp();
  const running = trials.run(job, owner, new AbortController().signal);
  await new Promise((resolve) => setImmediate(resolve));
  trials.resultChanged('sha256:other');
  store.set(digest, known);
  trials.resultChanged(digest);
  expect(await running).toBe(known);
  expect(said).toEqual(['wanted', 'submitted', 'settled']);
});

test('a run that is given up is not needed any more', async () => {
  const { trials, said } = setUp();
  const control = new AbortController();
  const running = trials.run(job, owner, control.signal);
  await new Promise((resolve) => setImmediate(resolve));
  control.abort();
  expect(await running).toBeNull();
  expect(said).toEqual(['wanted', 'submitted', 'released']);
});

test('a run that ends without an outcome is none', async () => {
  const { trials } = setUp();
  const running = trials.run(job, owner, new AbortController().signal);
  await new Promise((resolve) => setImmediate(resolve));
  trials.resultChanged(digest);
  expect(await running).toBeNull();
});
