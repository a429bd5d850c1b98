import { evaluateTrajectory } from '@stillroom/kernel/cells';
import { evaluateCell } from '@stillroom/kernel/engine';
import type { TrajectoryResult, TrajectorySettings } from '@stillroom/shared/cells';
import { readNetwork } from '@stillroom/shared/notation';
import { describe, expect, test } from 'vitest';
import { drawn, jobOf } from '../../support/cell-jobs.ts';

function run(text: string, settings: Omit<TrajectorySettings, 'network'>, warn?: (words: string) => void) {
  const { network, complaints } = readNetwork(text);
  if (network === null) throw new Error(complaints.map(({ message }) => message).join(' '));
  return evaluateTrajectory(network, { network: 'n', ...settings }, warn === undefined ? {} : { warn });
}

const species = ({ species: courses }: TrajectoryResult) => courses;

describe('a constant derived from others', () => {
  const text = (a: string) =>
    `let a = ${a}, b = 2*a, c = b/3 + exp(a)\nA -> B | b\nB -> A | c\nstart A = 5\n`;

  test('follows a trial value to the same bits as the text would give', () => {
    const settings = { until: 2, points: 5 };
    expect(run(text('1'), { ...settings, constants: { a: 0.1 } })).toEqual(run(text('0.1'), settings));
    expect(run(text('1'), { ...settings, constants: { a: 0.3 } })).toEqual(run(text('0.3'), settings));
  });

  test('has its own trial value where it is given one, which others then follow', () => {
    const settings = { until: 2, points: 5 };
    const given = run(text('1'), { ...settings, constants: { a: 0.5, b: 7 } });
    const written = run(text('0.5').replace('b = 2*a', 'b = 7'), settings);
    expect(given).toEqual(written);
  });

  test('gets a value where only the trial gives what it draws on', () => {
    const open = 'A -> B | k\nB -> A | q\nlet q = 2*k\nstart A = 1\n';
    expect(() => run(open, { until: 1 })).toThrow('have no value');
    expect(run(open, { until: 1, constants: { k: 1 } }).ended).toBe('complete');
  });

  test('that is no finite number with a trial value is refused by name', () => {
    expect(() => run('let a = 1, b = 1/a\nA -> B | b\n', { until: 1, constants: { a: 0 } })).toThrow(
      'With these constants b = 1/a is not a finite number.',
    );
  });

  test('follows what an event sets, unless an event sets it too', () => {
    const follows = run(
      'let q = 2*k\nA -> 0 | q\nB -> 0 | k = 1\nstart A = 1\nevent when t >= 1: k = 0.5\n',
      {
        times: [2],
        rtol: 1e-10,
      },
    );
    expect(species(follows)['A']![0]).toBeCloseTo(Math.exp(-3), 8);
    const own = run(
      'let q = 2*k\nA -> 0 | q\nB -> 0 | k = 1\nstart A = 1\nevent when t >= 1: k = 0.5\nevent when t >= 1.5: q = 0\n',
      { times: [3], rtol: 1e-10 },
    );
    expect(species(own)['A']![0]).toBeCloseTo(Math.exp(-3), 8);
  });
});

describe('an arrow whose constant is 0', () => {
  const text = 'A -> B | k = 1\nB -> A | q = 0\nB -> C | r = 0\nstart A = 5\n';

  test('is left out of a course, which says so', () => {
    const words: string[] = [];
    const result = run(text, { until: 1, points: 2 }, (said) => words.push(said));
    expect(words).toEqual(['Left out, because their constants are 0: B -> A (q = 0) and B -> C (r = 0).']);
    expect(species(result)['C']).toEqual([0, 0]);
  });

  test('comes back with a trial value, and goes with one', () => {
    const words: string[] = [];
    run(text, { until: 1, constants: { q: 1, r: 1 } }, (said) => words.push(said));
    expect(words).toEqual([]);
    run('A -> B | k = 1\n', { until: 1, constants: { k: 0 } }, (said) => words.push(said));
    expect(words).toEqual(['Left out, because its constant is 0: A -> B (k = 0).']);
  });

  test('stays where an event sets its constant or the course is differentiated by it', () => {
    const words: string[] = [];
    const told = (said: string) => words.push(said);
    const late = run(
      'A -> B | k = 0\nstart A = 1\nevent when t >= 1: k = 2\n',
      { times: [2], rtol: 1e-10 },
      told,
    );
    expect(species(late)['A']![0]).toBeCloseTo(Math.exp(-2), 8);
    const { sensitivities } = run(
      'A -> B | k = 0\nstart A = 1\n',
      { times: [3], sensitivities: ['k'] },
      told,
    );
    expect(sensitivities!['k']!['A']![0]).toBeCloseTo(-3, 8);
    expect(words).toEqual([]);
  });

  test('is a warning of the outcome of its cell', () => {
    const job = jobOf(
      'trajectory',
      '',
      { n: { ...drawn('network', undefined), text } },
      {
        network: 'n',
        until: 1,
      },
    );
    const { warnings } = evaluateCell(job, { checkpoint: () => undefined });
    expect(warnings).toEqual(['Left out, because their constants are 0: B -> A (q = 0) and B -> C (r = 0).']);
  });
});

describe('a start that draws on constants', () => {
  const text = (a: string) =>
    `let a = ${a}, b = a/3\nA + C -> B + C | 0.3\nstart A = (2*b), B = 1\nfix C = (a^2)\n`;
  const settings = { until: 2, points: 5 };

  test('and a fixed value follow a trial value to the same bits as the text would give', () => {
    const tried = run(text('1'), { ...settings, constants: { a: 0.1 } });
    expect(tried).toEqual(run(text('0.1'), settings));
    expect(species(tried)['A']![0]).toBe(2 * (0.1 / 3));
    expect(species(tried)['C']![4]).toBe(0.01);
  });

  test('has its own trial value where it is given one', () => {
    const tried = run(text('1'), { ...settings, constants: { a: 0.1 }, start: { A: 9 } });
    expect(species(tried)['A']![0]).toBe(9);
    expect(species(tried)['C']![0]).toBe(0.01);
  });

  test('that becomes negative or no finite number is refused by name', () => {
    const negative = 'let a = 3\nA -> 0 | 1\nstart A = (a - 2)\n';
    expect(() => run(negative, { until: 1, constants: { a: 1 } })).toThrow(
      'With these constants the value of A, a - 2, is negative.',
    );
    expect(() => run('let a = 3\nA -> 0 | 1\nstart A = (1/a)\n', { until: 1, constants: { a: 0 } })).toThrow(
      'With these constants the value of A, 1/a, is not a finite number.',
    );
  });
});
