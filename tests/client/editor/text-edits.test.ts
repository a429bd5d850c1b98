import { origins } from '@stillroom/shared/document';
import { addRow, alignColumns, applyChanges, setRowField, type TextChange } from '@stillroom/shared/notation';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import * as Y from 'yjs';
import { editNetwork, narrowed } from '../../../packages/client/src/editor/textEdits.ts';

function liveText(text: string): Y.Text {
  const live = new Y.Doc().getText('cell');
  live.insert(0, text);
  return live;
}

function change(from: number, to: number, insert: string): TextChange {
  return { from, to, insert };
}

describe('narrowing a change', () => {
  test('leaves what is put back as it was', () => {
    expect(narrowed('A -> B | k = 1', change(8, 14, ' k = 12'))).toEqual(change(14, 14, '2'));
    expect(narrowed('A -> B', change(0, 6, 'A -> BC'))).toEqual(change(6, 6, 'C'));
    expect(narrowed('A -> B', change(0, 6, 'A -> B'))).toEqual(change(6, 6, ''));
  });

  test('makes the same text', () => {
    const letters = fc.string({ unit: fc.constantFrom('a', 'b'), maxLength: 8 });
    fc.assert(
      fc.property(letters, letters, letters, letters, (before, old, insert, after) => {
        const text = before + old + after;
        const wide = change(before.length, before.length + old.length, insert);
        expect(applyChanges(text, [narrowed(text, wide)])).toBe(applyChanges(text, [wide]));
      }),
      { seed: 7, numRuns: 300 },
    );
  });
});

describe('editing a live network', () => {
  const text = 'A -> B | k = 1 | one\nB -> C | q\n\nC -> A | r';
  const edit = (live: Y.Text, make: (text: string) => TextChange | null) => {
    const made = make(live.toString());
    if (made !== null) editNetwork(live, made);
  };

  test('aligns the block it is in', () => {
    const live = liveText(text);
    edit(live, (now) => setRowField(now, 0, 'reaction', 'A + B -> D'));
    expect(live.toString()).toBe('A + B -> D | k = 1 | one\nB -> C     | q\n\nC -> A | r');
    expect(alignColumns(live.toString())).toEqual([]);
  });

  test('is one change of the author, which one undo takes back', () => {
    const live = liveText(text);
    const undo = new Y.UndoManager(live, { trackedOrigins: new Set([origins.author]) });
    edit(live, (now) => setRowField(now, 1, 'reaction', 'B + B + B -> C'));
    edit(live, (now) => addRow(now, 1, { reaction: 'C -> D' }));
    undo.undo();
    expect(live.toString()).toBe(text);
  });

  test('keeps what a co-author writes in the same field meanwhile', () => {
    const mine = liveText('A -> B | k = 1, q = 2');
    const theirs = new Y.Doc();
    Y.applyUpdate(theirs, Y.encodeStateAsUpdate(mine.doc as Y.Doc));
    edit(mine, (now) => setRowField(now, 0, 'constants', 'k = 15, q = 2'));
    edit(theirs.getText('cell'), (now) => setRowField(now, 0, 'constants', 'k = 1, q = 27'));
    Y.applyUpdate(mine.doc as Y.Doc, Y.encodeStateAsUpdate(theirs));
    expect(mine.toString()).toBe('A -> B | k = 15, q = 27');
  });
});
