import { readNetwork, tableOf } from '@stillroom/shared/notation';
import { describe, expect, test } from 'vitest';
import { complaintsByRow, keyRows, type KeyedRow } from '../../../packages/client/src/editor/tableRows.ts';

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
