import { readNetwork, tableOf } from '@stillroom/shared/notation';
import { describe, expect, test } from 'vitest';
import {
  complaintsByRow,
  fieldAt,
  fieldStart,
  keyRows,
  type KeyedRow,
} from '../../../packages/client/src/editor/tableRows.ts';

function keysAfter(before: string, after: string): number[] {
  let keys = 0;
  const fresh = () => (keys += 1);
  const rows: KeyedRow[] = keyRows([], tableOf(before), fresh);
  return keyRows(rows, tableOf(after), fresh).map(({ key }) => key);
}

describe('keys of rows', () => {
  test('stay with a row when one comes or goes before it', () => {
    expect(keysAfter('A -> B\nB -> C', 'X -> Y\nA -> B\nB -> C')).toEqual([3, 1, 2]);
    expect(keysAfter('A -> B\nB -> C\nC -> D', 'A -> B\nC -> D')).toEqual([1, 3]);
  });

  test('stay with a row that is rewritten', () => {
    expect(keysAfter('A -> B\nB -> C\nC -> D', 'A -> B\nB -> CC | k\nC -> D')).toEqual([1, 2, 3]);
  });

  test('stay with both when a row is rewritten and one put in after it', () => {
    expect(keysAfter('A -> B\nC -> D', 'A -> BB\nX -> Y\nC -> D')).toEqual([1, 3, 2]);
  });
});

describe('complaints at their rows', () => {
  const sorted = (text: string) => {
    const { of, others } = complaintsByRow(text, tableOf(text), readNetwork(text).complaints);
    return {
      rows: [...of].map(([line, found]) => [line, found.map(({ field }) => field)]),
      others: others.map(({ line }) => line),
    };
  };

  test('go by the field they are about', () => {
    expect(sorted('A -> B | k = 1 /s\nA -> | q = 1 /s\nB -> C | p = 2')).toEqual({
      rows: [
        [2, ['reaction']],
        [3, ['constants']],
      ],
      others: [],
    });
  });

  test('follow a row over the lines that a \\ joins', () => {
    expect(sorted('A -> B | k = 1 /s\nB -> C \\\n | p = 2')).toEqual({
      rows: [[2, ['constants']]],
      others: [],
    });
  });

  test('those of statements are about no row', () => {
    expect(sorted('A -> B | k\nstart Z = 1').others).toEqual([2]);
  });
});

describe('places in fields', () => {
  const text = '# two\nA -> B | k = 1 | note\nstart A = 1\nB -> C | 2 \\\n  /s | on\n';
  let keys = 0;
  const rows = keyRows([], tableOf(text), () => (keys += 1));
  const at = (words: string) => fieldAt(text, rows, text.indexOf(words));

  test('an offset lies in the field of its row, also where that goes on in the next line', () => {
    expect(at('-> B')).toEqual({ key: 1, field: 'reaction' });
    expect(at('= 1 |')).toEqual({ key: 1, field: 'constants' });
    expect(at('note')).toEqual({ key: 1, field: 'note' });
    expect(at('/s')).toEqual({ key: 2, field: 'constants' });
    expect(at('on\n')).toEqual({ key: 2, field: 'note' });
  });

  test('statements and comments lie in none', () => {
    expect(at('two')).toBeNull();
    expect(at('start')).toBeNull();
  });

  test('the words of a field begin where they stand in the text', () => {
    expect(fieldStart(text, 0, 'constants')).toBe(text.indexOf('k = 1'));
    expect(fieldStart(text, 0, 'note')).toBe(text.indexOf('note'));
    expect(fieldStart(text, 1, 'reaction')).toBe(text.indexOf('B -> C'));
    expect(fieldStart(text, 7, 'reaction')).toBeNull();
  });
});
