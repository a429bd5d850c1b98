import { describe, expect, test } from 'vitest';
import { renameUses } from '../../../packages/client/src/live/renameUses.ts';

const renamed = (kind: Parameters<typeof renameUses>[0], text: string, from: string, to: string) =>
  renameUses(kind, text, from, to)
    .reverse()
    .reduce((now, edit) => now.slice(0, edit.from) + edit.insert + now.slice(edit.to), text);

describe('uses of a renamed cell', () => {
  test('a claim: at the head of paths, not inside them nor in words', () => {
    expect(
      renamed('claim', 'last(run1.species.P) > run1.species["run1"][0] + other.run1.x', 'run1', 'course'),
    ).toBe('last(course.species.P) > course.species["run1"][0] + other.run1.x');
  });

  test('a claim: a longer name that begins alike is another cell', () => {
    expect(renameUses('claim', 'run10.times == run1_b.times', 'run1', 'course')).toEqual([]);
  });

  test('prose: woven values and references, not the words themselves', () => {
    const text = 'The run1 ended at =[run1.species.P, last, 3 digits], see [](#run1) and =[ run1["a"] ].';
    expect(renamed('prose', text, 'run1', 'course')).toBe(
      'The run1 ended at =[course.species.P, last, 3 digits], see [](#course) and =[ course["a"] ].',
    );
  });

  test('a script: identifiers, not properties, keys, words or comments', () => {
    const text = "const a = run1.times; // run1\nprint('run1', x.run1, { run1: 1 }, `${run1.times}`)";
    expect(renamed('script', text, 'run1', 'course')).toBe(
      "const a = course.times; // run1\nprint('run1', x.run1, { run1: 1 }, `${course.times}`)",
    );
  });

  test('a plot: the data its specification names', () => {
    const text = '{"data": {"name": "run1"}, "mark": "line", "title": "run1"}';
    expect(renamed('plot', text, 'run1', 'course')).toBe(
      '{"data": {"name": "course"}, "mark": "line", "title": "run1"}',
    );
  });

  test('letters outside ASCII are letters of a name', () => {
    expect(renameUses('claim', 'αrun.x == 1', 'run', 'course')).toEqual([]);
    expect(renamed('claim', 'μ1.x == 1', 'μ1', 'ν')).toBe('ν.x == 1');
  });
});
