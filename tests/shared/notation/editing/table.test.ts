import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  addRow,
  applyChanges,
  parseNetwork,
  removeRow,
  tableFields,
  tableOf,
  textOfReactionList,
  withRowField,
} from '@stillroom/shared/notation';
import { networkText, seeded } from '../texts.ts';

const text = '# head\nA -> B | k = 1 /s | decay # why\nstart A = 1 uM\nB -> C\nC => A | q\n';

describe('the table of a network', () => {
  test('shows the rows as they are written, sound or not', () => {
    expect(tableOf(text)).toEqual([
      { line: 2, reaction: 'A -> B', constants: 'k = 1 /s', note: 'decay' },
      { line: 4, reaction: 'B -> C', constants: '', note: '' },
      { line: 5, reaction: 'C => A', constants: 'q', note: '' },
    ]);
  });

  test.each([
    [0, 'reaction', 'A -> 2 B', 'A -> 2 B | k = 1 /s | decay # why'],
    [0, 'note', 'decays', 'A -> B | k = 1 /s | decays # why'],
    [1, 'constants', 'p = 3 /s', 'B -> C | p = 3 /s'],
    [1, 'note', 'slow', 'B -> C | | slow'],
    [2, 'reaction', 'C -> A', 'C -> A | q'],
    [2, 'constants', '', 'C => A |'],
  ] as const)('row %i: %s becomes %s', (row, field, value, line) => {
    expect(withRowField(text, row, field, value).split('\n')).toContain(line);
  });

  test('a field that is set is read back, and no other changes', () => {
    const value = fc.constantFrom('A -> B', 'k = 1', 'x', '', 'a | b', 'c # d', 'two\nlines', '\\');
    fc.assert(
      fc.property(
        networkText,
        fc.nat(10),
        fc.constantFrom(...tableFields),
        value,
        (written, place, field, given) => {
          const before = tableOf(written);
          if (before.length === 0) return;
          const row = place % before.length;
          if (field === 'reaction' && given.trim() === '') return;
          const after = tableOf(withRowField(written, row, field, given));
          const ends = field === 'note' ? /[#\r\n]|\\$/g : /[|#\r\n\\]/g;
          const clean = given.replace(ends, ' ').replace(/\s+/g, ' ').trim();
          if (clean === '' && field === 'reaction') return;
          const cells = ({ reaction, constants, note }: (typeof after)[number]) => ({
            reaction,
            constants,
            note,
          });
          expect(after.map(cells)).toEqual(
            before.map((each, i) => ({ ...cells(each), ...(i === row && { [field]: clean }) })),
          );
        },
      ),
      seeded,
    );
  });

  test('rows are added and taken out', () => {
    const added = applyChanges(text, [addRow(text, 0, { reaction: 'B -> 0', note: 'loss' })]);
    expect(added.split('\n')[2]).toBe('B -> 0 |  | loss');
    const atEnd = applyChanges(text, [addRow(text, 99, { reaction: 'X -> Y' })]);
    expect(atEnd).toBe(`${text}X -> Y\n`);
    const removed = removeRow(text, 0);
    expect(removed && applyChanges(text, [removed])).toBe('# head\nstart A = 1 uM\nB -> C\nC => A | q\n');
    expect(removeRow(text, 9)).toBeNull();
  });
});

describe('a pasted list of reactions', () => {
  test.each([
    ['A+B-->C; C==>A+B', 'A + B -> C\nC -> A + B\n'],
    ['R1: S + E ⇌ ES\nR2: ES → E + P', 'S + E <=> ES\nES -> E + P\n'],
    ['1. ∅ -> X\n2. X -> null', '0 -> X\nX -> 0\n'],
    ['A <=> B\tkf, kr\tfast', 'A <=> B | kf, kr | fast\n'],
    ['A <-> B; B <- C; C <--- D', 'A <=> B\nB <- C\nC <- D\n'],
  ])('%s is read', (pasted, wanted) => {
    expect(textOfReactionList(pasted)).toBe(wanted);
  });

  test('what is no list is left alone', () => {
    expect(textOfReactionList('Dear all, see below.')).toBeNull();
    expect(textOfReactionList('')).toBeNull();
  });

  test('a network of the notation is read as it is', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('A -> B | k = 1 /s', '2 A + B <=> 0 | p, q | note', 'start A = 1 uM\nA -> B'),
        (written) => {
          const result = textOfReactionList(written);
          expect(result === null ? null : parseNetwork(result).complaints).toEqual([]);
        },
      ),
    );
  });
});
