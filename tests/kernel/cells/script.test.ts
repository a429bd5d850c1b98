import { evaluateCell, type EngineControl } from '@stillroom/kernel/engine';
import { expect, test } from 'vitest';
import { drawn, jobOf } from '../../support/cell-jobs.ts';

/** A sandbox in which every script prints two lines and throws in its third. */
const throwing: EngineControl = {
  checkpoint: () => undefined,
  scripts: {
    run: () => ({ ended: 'threw', printed: ['one', 'two'], message: 'on purpose', line: 3, column: 7 }),
  },
};

test('a script that throws has failed, and keeps what it had printed', () => {
  const outcome = evaluateCell(jobOf('script', 'print(1)\nprint(2)\nthrow 1'), throwing);
  expect(outcome).toEqual({
    status: 'failed',
    error: { message: 'on purpose', line: 3, column: 7 },
    result: { printed: ['one', 'two'], value: null },
    warnings: [],
    keep: true,
  });
});

test('it is not kept where it stands on a run that was ended from outside', () => {
  const stopped = {
    ...drawn('trajectory', undefined),
    digest: 'sha256:a',
    failed: { message: 'Stopped.' },
  };
  const job = jobOf('script', 'throw 1', { run1: stopped });
  expect(evaluateCell(job, throwing)).toMatchObject({ status: 'failed', keep: false });
});
