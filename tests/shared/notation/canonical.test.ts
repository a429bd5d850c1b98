import fc from 'fast-check';
import { CanonicalLines, canonicalText } from '@stillroom/shared/notation';
import { describe, expect, test } from 'vitest';
import { networkText } from './texts.ts';

const seeded = { seed: 20261201, numRuns: 200 };

describe('the canonical text of a network that is written on', () => {
  test('is that of the text read anew, whatever was there before', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.tuple(networkText, fc.nat(400), fc.constantFrom('', 'A', ' -> ', '=>', '\n', '|', '\\\n', '#')),
          {
            minLength: 2,
            maxLength: 5,
          },
        ),
        (edits) => {
          const lines = new CanonicalLines();
          let text = '';
          for (const [more, at, insert] of edits) {
            const place = Math.min(at, text.length);
            text = `${text.slice(0, place)}${insert}${text.slice(place)}\n${more}`;
            expect(canonicalText(text, lines)).toBe(canonicalText(text));
          }
        },
      ),
      seeded,
    );
  });

  test('comes back when a broken line is mended', () => {
    const lines = new CanonicalLines();
    expect(canonicalText('A -> B\nB -> C', lines)).toBe('A -> B\nB -> C\n');
    expect(canonicalText('A -> B\nB => C', lines)).toBeNull();
    expect(canonicalText('A -> B\nB -> C', lines)).toBe('A -> B\nB -> C\n');
  });

  test('of a long text is read in steps', () => {
    const text = Array.from({ length: 5000 }, (_, i) => `A${i} + B <=> C${i} | p${i}, q${i}`).join('\n');
    const lines = new CanonicalLines();
    const steps = [...lines.read(text)].length;
    expect(steps).toBeGreaterThan(3);
    expect(canonicalText(text, lines)).toBe(canonicalText(text));
    // What has not changed is not read again.
    expect([...lines.read(`${text}\nB -> 0`)]).toEqual([]);
  });
});
