import type { CellJob, TrajectoryResult } from '@stillroom/shared/cells';
import { type EngineControl, evaluateCell, StopRequested } from '@stillroom/kernel/engine';
import { digestOf } from '@stillroom/shared/plan';
import { describe, expect, test } from 'vitest';
import { drawn, jobOf } from '../../support/cell-jobs.ts';

const freely: EngineControl = { checkpoint: () => undefined };
const network = (text: string) => ({ yeast: { ...drawn('network', undefined), text } });

test('a result carries the digest of its canonical JSON', () => {
  const outcome = evaluateCell(jobOf('network', 'A -> B | k = 1 /s\n'), freely);
  if (outcome.status === 'failed') throw new Error(outcome.error.message);
  expect(outcome.resultDigest).toBe(digestOf(outcome.result));
  expect(outcome.keep).toBe(true);
});

describe('networks', () => {
  test('an error of the text stands where its author wrote it, comments counted', () => {
    const job = {
      ...jobOf('network', 'A -> B | 1\nfix Q = \n'),
      written: '# one\n# two\nA -> B | 1\nfix Q = ',
    };
    expect(evaluateCell(job, freely)).toMatchObject({ status: 'failed', error: { line: 4 } });
  });

  test('a cell that draws on a network that cannot be read says which and where', () => {
    const job = jobOf('structure', '', network('A -> B | 1\nA - B\n'), { network: 'yeast' });
    const outcome = evaluateCell(job, freely);
    expect(outcome.status === 'failed' && outcome.error.message).toMatch(/^yeast cannot be read\. Line 2: /u);
  });
});

describe('courses', () => {
  const decay = network('A -> B | k = 0.5 /s\nstart A = 8 uM\n');

  test('a closed form: A(t) = 8 exp(-t/2)', () => {
    const job = jobOf('trajectory', '', decay, { network: 'yeast', until: 2, points: 3, rtol: 1e-10 });
    const outcome = evaluateCell(job, freely);
    if (outcome.status === 'failed') throw new Error(outcome.error.message);
    const { species, times } = outcome.result as TrajectoryResult;
    expect(times).toEqual([0, 1, 2]);
    species['A']?.forEach((value, index) => expect(value).toBeCloseTo(8 * Math.exp(-index / 2), 7));
  });

  test('a stop leaves the course so far, marked as part and not to be kept', () => {
    let looks = 0;
    const stopping: EngineControl = {
      checkpoint: () => {
        if (++looks > 5) throw new StopRequested('stop');
      },
    };
    const job = jobOf('trajectory', '', network('A -> B | 1\nB -> A | 1\nstart A = 1\n'), {
      network: 'yeast',
      until: 1e6,
      method: 'nonstiff',
    });
    const outcome = evaluateCell(job, stopping);
    expect(outcome).toMatchObject({
      status: 'failed',
      partial: true,
      keep: false,
      result: { ended: 'stopped' },
    });
    expect(outcome.status === 'failed' && outcome.error.message).toContain('The run was stopped.');
  });

  test('growth without bound is a result that says why it stopped', () => {
    const job = jobOf('trajectory', '', network('2 A -> 3 A | 1\nstart A = 1\n'), {
      network: 'yeast',
      until: 5,
    });
    const outcome = evaluateCell(job, freely);
    expect(outcome).toMatchObject({ status: 'ok', keep: true, result: { ended: 'stopped' } });
    expect(outcome.warnings.join()).toContain('grows without bound');
  });

  test('events of the cell are read like those of the text', () => {
    const settings = { network: 'yeast', until: 2, points: 5, events: [{ when: 't > 1', set: { A: 100 } }] };
    const outcome = evaluateCell(jobOf('trajectory', '', decay, settings), freely);
    expect(outcome).toMatchObject({ status: 'ok', result: { fired: [{ event: 0 }] } });
    const wrong = { ...settings, events: [{ when: 't >', set: { A: 1 } }] };
    const refused = evaluateCell(jobOf('trajectory', '', decay, wrong), freely);
    expect(refused.status === 'failed' && refused.error.message).toMatch(/^Event 1 cannot be read: /u);
    const smuggled = {
      ...settings,
      events: [{ when: 't > 1: A = 1\nB -> 0 | 9\nevent when t > 2', set: { A: 1 } }],
    };
    expect(evaluateCell(jobOf('trajectory', '', decay, smuggled), freely).status).toBe('failed');
  });
});

describe('nothing is thrown', () => {
  test.each([
    ['without a sandbox scripts fail in words', jobOf('script', 'return 1'), 'Scripts cannot be run here.'],
    [
      'a network that is not there',
      jobOf('structure', '', {}, { network: 'gone' }),
      'There is no cell called gone.',
    ],
    [
      'a failed cell',
      jobOf('prose', '=[a.x]', { a: { ...drawn('script', null), failed: { message: 'x' } } }),
      'It draws on a, which failed.',
    ],
  ] satisfies [string, CellJob, string][])('%s', (_name, job, message) => {
    expect(evaluateCell(job, freely)).toMatchObject({ status: 'failed', error: { message } });
  });

  test('a stop before anything is done', () => {
    const stopped: EngineControl = {
      checkpoint: () => {
        throw new StopRequested('deadline');
      },
    };
    expect(evaluateCell(jobOf('claim', '1 == 1'), stopped)).toMatchObject({ status: 'failed', keep: false });
  });
});
