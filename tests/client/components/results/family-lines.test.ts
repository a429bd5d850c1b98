import type { NetworkResult } from '@stillroom/shared/cells';
import { describe, expect, test } from 'vitest';
import { writtenArrows } from '../../../../packages/client/src/components/results/familyLines.ts';
import {
  hasFamily,
  reactionLines,
  withFamilies,
  writtenLines,
} from '../../../../packages/client/src/components/results/reactionLines.ts';

const text = [
  '# a ring',
  'A -> X[1]                                    | feed | inlet',
  'let L = 3',
  '[i = 1..L where i % 2 == 1] X[i] <=> X[i % L + 1] -> 2 B | p, q[i], law = B | hop',
  'B <- A | back',
].join('\n');
const listed = (row: number, from: string, to: string, rate: string) => ({
  label: `${from} -> ${to}`,
  row,
  from: { [from]: 1 },
  to: { [to]: 1 },
  rate: `${rate}*${from}`,
  note: '',
});
const result: NetworkResult = {
  species: ['A', 'X[1]', 'X[2]', 'B'],
  constants: [{ name: 'p', value: 2, unit: '/s' }],
  start: {},
  reactions: [
    listed(0, 'A', 'X[1]', 'feed'),
    listed(1, 'X[1]', 'X[2]', 'p'),
    listed(1, 'X[3]', 'X[1]', 'p'),
    listed(2, 'A', 'B', 'back'),
  ],
  equations: [],
  canonical: '',
  counts: { species: 4, reactions: 4, constants: 1 },
  units: null,
};

test('a row is a family where it begins with its indices', () => {
  expect(hasFamily(text)).toBe(true);
  expect(hasFamily('A[1] -> B | k[1]\n# [i = 1..3]')).toBe(false);
});

describe('rows as they are written', () => {
  const arrows = writtenArrows(text);

  test('each arrow of a chain has its sides, its constants and the indices it runs over', () => {
    expect(arrows[1]).toEqual({
      row: 1,
      from: { 'X[i]': 1 },
      to: { 'X[i%L+1]': 1 },
      both: true,
      rates: ['p', 'q[i]'],
      over: 'i = 1 … L where i % 2 == 1',
    });
    expect(arrows[2]).toMatchObject({ row: 1, to: { B: 2 }, both: false, rates: ['B', null] });
  });

  test('an arrow to the left is turned round', () => {
    expect(arrows[3]).toMatchObject({ from: { A: 1 }, to: { B: 1 }, over: null });
  });
});

test('a family stands as its one line, with its size; other rows stay as they are', () => {
  const notes = ['inlet', 'hop', ''];
  const written = writtenLines(writtenArrows(text), result, notes);
  const lines = withFamilies(reactionLines(result, notes), written);
  expect(lines.map(({ row, ofRow }) => [row, ofRow])).toEqual([
    [0, 0],
    [1, 1],
    [null, 1],
    [2, 2],
  ]);
  expect(lines[1]).toMatchObject({
    family: { over: 'i = 1 … L where i % 2 == 1', reactions: 2 },
    forward: { name: 'p', value: 2, unit: '/s' },
    backward: { name: 'q[i]', value: null },
    note: 'hop',
  });
});
