import { Text } from '@codemirror/state';
import { expect, test } from 'vitest';
import { linesOfRows } from '../../../packages/client/src/editor/litLines.ts';

const ledger = Text.of([
  '# a comment',
  'A -> B | k',
  '',
  'B -> C | 1 \\',
  '  /s | goes on',
  'start A = 1',
  'C -> A | 2',
]);

test('a row is lit on its own line, whatever comments and statements stand between', () => {
  expect(linesOfRows(ledger, new Set([0, 2]))).toEqual([2, 7]);
});

test('a row that goes on in the next line is lit on both', () => {
  expect(linesOfRows(ledger, new Set([1]))).toEqual([4, 5]);
});

test('rows that the text does not have light nothing', () => {
  expect(linesOfRows(ledger, new Set([7]))).toEqual([]);
});
