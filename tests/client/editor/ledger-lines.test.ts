import { describe, expect, test } from 'vitest';
import { tableOf } from '@stillroom/shared/notation';
import { isRow, rowNotes, rowNumbers } from '../../../packages/client/src/editor/ledgerLines.ts';

describe('the lines of a ledger', () => {
  test('rows are numbered; comments, statements and blank lines are not', () => {
    const lines = ['# E enzyme', 'E + S <=> ES | kf, kr', '', 'start E = 1', 'ES -> E + P', 'A → B'];
    expect(rowNumbers(lines)).toEqual([0, 1, 0, 0, 2, 3]);
  });

  test('a row that goes on in the next line has one number', () => {
    expect(rowNumbers(['A -> B | k = 1 \\', '  /s | note -> here', 'B -> C'])).toEqual([1, 0, 2]);
  });

  test('comments and statements make no row, whatever arrows are in them', () => {
    expect(isRow('# A -> B')).toBe(false);
    expect(isRow('let a = 2 # -> b')).toBe(false);
    expect(isRow('  # A -> B')).toBe(false);
    expect(isRow('[i = 1..3] X[i] -> 0')).toBe(true);
  });

  test('a row that is not sound yet has its number already, the same as in the table', () => {
    const lines = ['A + B', 'start A = 1', 'B -> | k', '', '| q', 'ratex -> B \\', 'start'];
    const numbers = rowNumbers(lines);
    expect(numbers).toEqual([1, 0, 2, 0, 3, 4, 0]);
    expect(tableOf(lines.join('\n')).map(({ line }) => numbers[line - 1])).toEqual([1, 2, 3, 4]);
  });

  test('notes go by row, empty where there is none', () => {
    expect(rowNotes('# head\nA -> B | k | first\nB -> C\nC -> A | k | third # why')).toEqual([
      'first',
      '',
      'third',
    ]);
  });
});
