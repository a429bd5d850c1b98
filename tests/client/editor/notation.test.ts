import { EditorState, Text } from '@codemirror/state';
import type { Complaint } from '@stillroom/shared/notation';
import { describe, expect, test } from 'vitest';
import { alignedColumns, alignmentAround } from '../../../packages/client/src/editor/alignedColumns.ts';
import { shownAtOnce } from '../../../packages/client/src/editor/complaints.ts';
import { coloursOf, columnOf } from '../../../packages/client/src/editor/notationHighlighting.ts';
import { isLong } from '../../../packages/client/src/editor/notationReading.ts';
import { notationOfPasted } from '../../../packages/client/src/editor/pastedReactions.ts';

describe('colours', () => {
  const styles = (line: string, column = 0) =>
    coloursOf(line, column).map(({ from, to, style }) => [line.slice(from, to), style]);

  test('are those of LOOK: numbers, notes, comments, bars; species stay in ink', () => {
    expect(styles('E + 2 S -> P | k = 1 /s | made # so')).toEqual([
      ['2', 'number'],
      ['->', 'arrow'],
      ['|', 'bar'],
      ['1', 'number'],
      ['/s', 'unit'],
      ['|', 'bar'],
      ['made', 'note'],
      ['# so', 'comment'],
    ]);
  });

  test('go on where a \\ joins two lines', () => {
    const doc = Text.of(['A -> B | k \\', ' = 2 | made \\', 'here', 'B -> C']);
    expect([1, 2, 3, 4].map((line) => columnOf(doc, line))).toEqual([0, 1, 2, 0]);
    expect(styles('here', 2)).toEqual([['here', 'note']]);
  });
});

describe('aligning in the editor', () => {
  const type = (doc: string, at: number, insert: string, userEvent = 'input.type') => {
    const state = EditorState.create({ doc, extensions: alignedColumns, selection: { anchor: at } });
    return state.update({
      changes: { from: at, insert },
      selection: { anchor: at + insert.length },
      userEvent,
    }).state;
  };
  const text = 'A -> B | k\nB -> C | q\n\nC -> D   | r';

  test('aligns the block of what was typed, and leaves the caret behind it', () => {
    const { doc, selection } = type(text, 6, 'B');
    expect(doc.toString()).toBe('A -> BB | k\nB -> C  | q\n\nC -> D   | r');
    expect(selection.main.head).toBe(7);
    expect(type('A -> B| k', 6, 'B').selection.main.head).toBe(7);
  });

  test('leaves alone what co-authors write and what is being composed', () => {
    expect(type(text, 6, 'B', 'remote').doc.toString()).toBe('A -> BB | k\nB -> C | q\n\nC -> D   | r');
    expect(type(text, 6, 'B', 'input.type.compose').doc.toString()).toContain('BB | k\nB -> C | q');
  });

  test('leaves a block of many rows as it is written; the editor only draws it aligned', () => {
    const rows = Array.from({ length: 100 }, (_, i) => `A${100 + i} -> B | k`).join('\n');
    expect(type(rows, 9, 'B').doc.lineAt(20).text).toBe('A101 -> B | k');
    expect(alignmentAround(type(rows, 9, 'B').doc, 9, 9)).toHaveLength(99);
  });
});

describe('pasting', () => {
  test('a list of reactions becomes notation', () => {
    expect(notationOfPasted('1. A + B => C\n2. C <==> D', '')).toBe('A + B -> C\nC <=> D');
    expect(notationOfPasted('A ⟶ B\tk1\tfirst\n', '  ')).toBe('A -> B | k1 | first\n');
  });

  test('numbers of a list are no coefficients', () => {
    expect(notationOfPasted('1. A -> B\n2. B -> C', '')).toBe('A -> B\nB -> C');
  });

  test.each(['A -> B   | k', 'start A = 2 uM', 'some words, no reactions => at all?', 'k = 2 /s'])(
    'stays as it is: %s',
    (pasted) => {
      expect(notationOfPasted(pasted, '')).toBe(pasted);
    },
  );

  test('within a line stays as it is', () => {
    expect(notationOfPasted('A => B', 'X + ')).toBe('A => B');
  });
});

describe('telling what is wrong', () => {
  const complaint = (line: number, message: string): Complaint => ({
    ...{ severity: 'error', line, column: 1, from: 0, to: 0 },
    ...{ message, hint: null, repairs: [] },
  });

  test('what is new in the line one types in waits', () => {
    const found = [complaint(1, 'old'), complaint(1, 'new'), complaint(2, 'other')];
    expect(shownAtOnce(found, [complaint(1, 'old')], 1).map(({ message }) => message)).toEqual([
      'old',
      'other',
    ]);
    expect(shownAtOnce(found, [], 0)).toEqual(found);
  });

  test('texts that take longer than a frame are read elsewhere: many lines, or a family', () => {
    expect(isLong('A -> B\n'.repeat(20))).toBe(false);
    expect(isLong('A -> B\n'.repeat(200))).toBe(true);
    expect(isLong('[i = 1..1000000] X[i] -> 0')).toBe(true);
  });
});
