import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { alignColumns, applyChanges, parseNetwork, printNetwork } from '@stillroom/shared/notation';
import { anyText, networkText, seeded } from '../texts.ts';

const aligned = (text: string) => applyChanges(text, alignColumns(text));

describe('aligning as one types', () => {
  test('lines up the bars of a block and leaves other blocks alone', () => {
    const text = 'A -> B | k = 1 | a\nA + B + C -> D| q| b\nP -> 0\n\nX -> Y| p';
    expect(aligned(text)).toBe(
      'A -> B         | k = 1 | a\nA + B + C -> D | q     | b\nP -> 0\n\nX -> Y | p',
    );
  });

  test('takes away what is too much', () => {
    expect(aligned('A -> B       | k\nAB -> C      | q')).toBe('A -> B  | k\nAB -> C | q');
  });

  test('changes blanks before bars only', () => {
    fc.assert(
      fc.property(fc.oneof(networkText, anyText), (text) => {
        for (const { from, to, insert } of alignColumns(text)) {
          expect(text.slice(from, to).trim() + insert.trim()).toBe('');
          expect(text[to]).toBe('|');
        }
      }),
      seeded,
    );
  });

  test('what is aligned or printed stays as it is', () => {
    fc.assert(
      fc.property(networkText, (text) => {
        const once = aligned(text);
        expect(aligned(once)).toBe(once);
        expect(alignColumns(printNetwork(parseNetwork(text).tree))).toEqual([]);
      }),
      seeded,
    );
  });

  test('around an offset it does to that block what it does to the whole', () => {
    fc.assert(
      fc.property(networkText, fc.nat(), (text, place) => {
        const at = text.length === 0 ? 0 : place % (text.length + 1);
        const all = alignColumns(text);
        const some = alignColumns(text, at);
        expect(all).toEqual(expect.arrayContaining(some));
        const line = text.lastIndexOf('\n', at - 1) + 1;
        const end = text.indexOf('\n', at);
        const own = all.filter(({ from }) => from >= line && (end < 0 || from < end));
        expect(some).toEqual(expect.arrayContaining(own));
      }),
      seeded,
    );
  });
});
