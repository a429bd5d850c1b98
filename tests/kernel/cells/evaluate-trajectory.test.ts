import { type EngineControl, evaluateCell, StopRequested } from '@stillroom/kernel/engine';
import { expect, test } from 'vitest';
import { drawn, jobOf } from '../../support/cell-jobs.ts';

const jobOn = (text: string, settings = {}) =>
  jobOf(
    'trajectory',
    '',
    { n: { ...drawn('network', undefined), text } },
    { network: 'n', until: 1, ...settings },
  );

test('a stop while a large network is prepared ends the run in the words of the stop, with nothing left', () => {
  let looks = 0;
  const stopping: EngineControl = {
    checkpoint: () => {
      if (++looks > 3) throw new StopRequested('deadline');
    },
  };
  const outcome = evaluateCell(
    jobOn('[i = 1..3000] X[i] <=> X[i % 3000 + 1] | p = 1, p\nstart X[1] = 1\n'),
    stopping,
  );
  expect(outcome).toMatchObject({
    status: 'failed',
    keep: false,
    error: { message: 'The time allowed is over.' },
  });
  expect('result' in outcome && outcome.result !== undefined).toBe(false);
});

test('the drift of conservation laws counts amounts where a law goes across compartments', () => {
  // n_A = V_c A + V_d B is kept, A + B is not.
  const text = 'volume cell = 1 L\nvolume drop = 0.001 L\nin drop: B\nA -> B | law = 0.5*A\nstart A = 1 M\n';
  const outcome = evaluateCell(jobOn(text), { checkpoint: () => undefined });
  if (outcome.status === 'failed') throw new Error(outcome.error.message);
  const { conservationDrift, species } = outcome.result as {
    conservationDrift: number;
    species: Record<string, number[]>;
  };
  expect(conservationDrift).toBeLessThan(1e-13);
  expect(species['B']!.at(-1)).toBeGreaterThan(100);
});
