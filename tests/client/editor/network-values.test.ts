import { applyChanges } from '@stillroom/shared/notation';
import { expect, test } from 'vitest';
import { valueChange } from '../../../packages/client/src/editor/networkValues.ts';

const text = [
  '# open',
  '0 -> A   | ks = 0.16 uM/s | supply',
  'A -> 0   | 2 /min, # no name',
  'A <=> B  | kf = (1 + 2) /s, kr',
  'let kr = 3 /min',
  'start A = 20 uM, B = 5 nM',
  '[i = 1..3] X[i] -> 0 | p[i]',
  'let p[i] = 1/i for i = 1..3',
].join('\n');

const write = (kind: 'constants' | 'start', name: string, own: number, value: number) => {
  const change = valueChange(text, kind, name, { own, value });
  return change === null ? null : applyChanges(text, [change]);
};

test('a constant is written where its row gives it, its unit left alone', () => {
  expect(write('constants', 'ks', 0.16, 0.12)).toBe(text.replace('0.16', '0.12'));
});

test('a value in another unit than the results changes in proportion', () => {
  expect(write('constants', 'kr', 0.05, 0.1)).toBe(text.replace('kr = 3 /min', 'kr = 6 /min'));
  expect(write('start', 'B', 0.005, 0.01)).toBe(text.replace('5 nM', '10 nM'));
});

test('a start is written in its statement', () => {
  expect(write('start', 'A', 20, 35)).toBe(text.replace('20 uM', '35 uM'));
});

test('what is reckoned, stands for a family, or is not given is left alone', () => {
  expect(write('constants', 'kf', 3, 4)).toBeNull();
  expect(write('constants', 'p[1]', 1, 4)).toBeNull();
  expect(write('constants', 'p', 1, 4)).toBeNull();
  expect(write('start', 'C', 1, 4)).toBeNull();
});
