import type { ClaimResult } from '@stillroom/shared/cells';
import { evaluateCell } from '@stillroom/kernel/engine';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { course, drawn, errorOf, jobOf, resultOf } from '../../support/cell-jobs.ts';

const structure = {
  counts: { deficiency: 0, species: 4 },
  weaklyReversible: true,
  robustSpecies: [],
  verdicts: [{ id: 'deficiency-zero', applies: 'yes' }],
  rank: null,
  huge: '12345678901234567891',
  third: '1/3',
};
const inputs = {
  structure1: drawn('structure', structure),
  run1: drawn('trajectory', course),
  enzyme: drawn('network', { constants: [{ name: 'kf', value: 0.1, unit: null }] }),
  script1: drawn('script', { printed: [], value: { list: [1, 2, 6], mean: 0.30000000000000004 } }),
};
const judge = (text: string) => resultOf<ClaimResult>(jobOf('claim', text, inputs));

describe('holds and fails', () => {
  test.each([
    ['structure1.counts.deficiency == 0', 'holds', '0 equals 0, exactly.'],
    ['structure1.counts.deficiency + 1 == 0', 'fails', '1 does not equal 0, exactly.'],
    ['structure1.third * 3 == 1', 'holds', '1 equals 1, exactly.'],
    ['structure1.huge - 12345678901234567890 == 1', 'holds', '1 equals 1, exactly.'],
    ['0.1 + 0.2 == 0.3', 'holds', '0.3 equals 0.3, exactly.'],
    ['enzyme.constants[0].value == 0.1', 'holds', '0.1 equals 0.1, exactly.'],
    ['-2^2 == -4', 'holds', '−4 equals −4, exactly.'],
    ['2^3^2 == 512', 'holds', '512 equals 512, exactly.'],
    ['structure1.verdicts[0].applies == "yes"', 'holds', '“yes” equals “yes”.'],
    ['structure1.weaklyReversible != false', 'holds', 'true differs from false.'],
    ['last(run1.species.P) > 9.5', 'holds', '9.87650 is above 9.5.'],
    ['at(run1.species.P, 3) < 8', 'fails', '8.68825 is not below 8.'],
    ['run1.species["X[3]"][0] >= 1', 'holds', '1.00000 is at least 1.'],
    ['mean(script1.value.list) == 3', 'holds', '3 equals 3, exactly.'],
    ['max(1, 5/2, 2) == 2.5', 'holds', '2.5 equals 2.5, exactly.'],
    ['sum(script1.value.list) - count(script1.value.list) == 6', 'holds', '6 equals 6, exactly.'],
    ['abs(script1.value.mean - 0.3) < 1e-9', 'holds', undefined],
    ['sd(script1.value.list)^2 < 7.001', 'holds', undefined],
    ['4^0.5 <= 2', 'holds', undefined],
  ])('%s %s', (text, verdict, why) => {
    const result = judge(text);
    expect(result.verdict).toBe(verdict);
    if (why !== undefined) expect(result.why).toBe(why);
  });

  test('left and right are kept as the result has them, with the figures it rests on', () => {
    expect(judge('structure1.huge > last( run1.species.P )')).toEqual({
      verdict: 'holds',
      left: 12345678901234567000,
      right: 9.8765,
      why: '12345678901234567891 is above 9.87650.',
      figures: [
        { path: 'structure1.huge', value: '12345678901234567891' },
        { path: 'last( run1.species.P )', value: 9.8765 },
      ],
    });
  });

  test('numbers that read alike are shown with all their digits', () => {
    expect(judge('script1.value.mean > 0.3').why).toBe('0.30000000000000004 is above 0.3.');
  });
});

describe('undecided', () => {
  test('a value that is not decided', () => {
    expect(judge('structure1.rank == 3')).toMatchObject({ verdict: 'undecided', left: null, right: null });
  });
  test('division by nothing', () => {
    expect(judge('1 / structure1.counts.deficiency > 0').why).toBe('It divides by 0.');
  });
  test('a failed cell, and such a judgement is not kept', () => {
    const failed = { ...drawn('trajectory', undefined), failed: { message: 'The time is over.' } };
    const outcome = evaluateCell(jobOf('claim', 'last(run1.species.P) > 1', { run1: failed }), {
      checkpoint: () => undefined,
    });
    expect(outcome).toMatchObject({
      status: 'ok',
      keep: false,
      result: { verdict: 'undecided', why: 'run1 failed: The time is over.' },
    });
  });
});

describe('what is refused, with its place', () => {
  test.each([
    ['run1.species.P[0] == 0', '== compares exact values'],
    ['run1.times[1] != 2', '!= compares exact values'],
    ['script1.value.mean == 0.3', 'measured'],
    ['run1.species.Q > 1', 'run1.species has no Q.'],
    ['run1.species.X[3] > 1', 'run1.species has no X.'],
    ['run1.species.P > 1', 'list of 4'],
    ['run1.species > 1', 'holds several values'],
    ['structure1.counts.deficiency', 'needs a comparison'],
    ['structure1.counts.deficiency = 0', 'A single = compares nothing.'],
    ['1 < 2 < 3', 'one comparison'],
    ['wobble(3) > 1', 'no function wobble'],
    ['at(run1.species.P) > 1', 'a path and a time'],
    ['at(run1.species.P, 9) > 1', 'runs from 0 to 4'],
    ['"a" < "b"', 'compares numbers'],
    ['"a" == 1', 'cannot be compared'],
    ['(1 + 2 == 3', 'closing bracket'],
    ['1 +  == 3', '"== 3" is neither'],
    ['2 ^ 0.3 > 1', 'An exponent is a whole number'],
    ['', 'says nothing yet'],
  ])('%s', (text, words) => {
    expect(errorOf(jobOf('claim', text, inputs)).message).toContain(words);
  });

  test('line, column and hint', () => {
    expect(errorOf(jobOf('claim', 'run1.times[0] <\n  run1.species.X[3]', inputs))).toEqual({
      message: 'run1.species has no X.',
      hint: 'An indexed name is written in quotes: run1.species["X[3]"].',
      line: 2,
      column: 3,
    });
  });

  test('names of the language are no way out of a result', () => {
    for (const step of ['constructor', '__proto__', 'toString', 'length', '["__proto__"]']) {
      const text = `structure1.counts${step.startsWith('[') ? step : `.${step}`} == 0`;
      expect(errorOf(jobOf('claim', text, inputs)).message).toContain('has no');
    }
    expect(errorOf(jobOf('claim', 'constructor.name == "Object"', inputs)).message).toContain(
      'no cell called',
    );
  });
});

test('exact arithmetic agrees with integers of any size', () => {
  fc.assert(
    fc.property(fc.bigInt(), fc.bigInt(), fc.bigInt({ min: 1n, max: 10n ** 20n }), (a, b, c) => {
      const text = `(${a} + ${b}) * ${c} / ${c} == ${a + b}`.replaceAll('+ -', '- ').replaceAll('(-', '(0 -');
      const positive = text.replace(/== -(\d+)$/u, '== 0 - $1');
      return judge(positive).verdict === 'holds';
    }),
    { seed: 20261201, numRuns: 200 },
  );
});
