import { describe, expect, test } from 'vitest';
import { barsOf, isRow, rowNotes, rowNumbers } from '../../../packages/client/src/editor/ledgerLines.ts';

describe('the lines of a ledger', () => {
  test('rows are numbered; comments, statements and blank lines are not', () => {
    const lines = ['# E enzyme', 'E + S <=> ES | kf, kr', '', 'start E = 1', 'ES -> E + P', 'A → B'];
    expect(rowNumbers(lines)).toEqual([0, 1, 0, 0, 2, 3]);
  });

  test('a row that goes on in the next line has one number', () => {
    expect(rowNumbers(['A -> B | k = 1 \\', '  /s | note -> here', 'B -> C'])).toEqual([1, 0, 2]);
  });

  test('an arrow in a comment or a constant makes no row', () => {
    expect(isRow('# A -> B')).toBe(false);
    expect(isRow('let a = 2 # -> b')).toBe(false);
    expect(isRow('A | B -> C')).toBe(false);
  });

  test('bars are those before a comment', () => {
    expect(barsOf('A -> B | k | note # | more')).toEqual([7, 11]);
    expect(barsOf('A -> B # | not')).toEqual([]);
  });

  test('notes go by row, empty where there is none', () => {
    expect(rowNotes('# head\nA -> B | k | first\nB -> C\nC -> A | k | third # why')).toEqual([
      'first',
      '',
      'third',
    ]);
  });
});
