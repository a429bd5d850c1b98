import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { canonicalText, parseNetwork, printNetwork } from '@stillroom/shared/notation';
import { networkText, seeded } from './texts.ts';

/** A tree without places, and without blanks at the ends of comments. */
function meaning(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(meaning);
  if (typeof value !== 'object' || value === null) return value;
  const places = new Set(['from', 'to', 'line', 'unitSpan', 'itemsSpan']);
  return Object.fromEntries(
    Object.entries(value)
      .filter(([key]) => !places.has(key))
      .map(([key, inner]) => [
        key,
        key === 'comment' && typeof inner === 'string' ? inner.trimEnd() : meaning(inner),
      ]),
  );
}

function print(text: string): string {
  const { tree, complaints } = parseNetwork(text);
  expect(complaints, text).toEqual([]);
  return printNetwork(tree);
}

describe('printing', () => {
  test('reading what was printed gives the same tree', () => {
    fc.assert(
      fc.property(networkText, (text) => {
        const { tree } = parseNetwork(text);
        expect(meaning(parseNetwork(print(text)).tree)).toEqual(meaning(tree));
      }),
      seeded,
    );
  });

  test('printing twice changes nothing', () => {
    fc.assert(
      fc.property(networkText, (text) => {
        const once = print(text);
        expect(print(once)).toBe(once);
      }),
      seeded,
    );
  });

  test('columns are aligned within a block, in ASCII, with one space between words', () => {
    const text =
      'E+S⇌ES→E+P|kf=0.1 µM^-1 s^-1,kr=2/s,kc=1.5 /s|binding\n∅<=>S |feed=0.3 uM/s,wash=.05 /s\nP->0|wash|  # out\n\nA -> B | k';
    expect(print(text)).toBe(
      [
        'E + S <=> ES -> E + P | kf = 0.1 /uM/s, kr = 2 /s, kc = 1.5 /s | binding',
        '0 <=> S               | feed = 0.3 uM/s, wash = .05 /s',
        'P -> 0                | wash  # out',
        '',
        'A -> B | k',
        '',
      ].join('\n'),
    );
  });

  test.each([
    ['A + A -> B', '2 A -> B'],
    ['2A+0.5 B -> 3/6 C', '2 A + 1/2 B -> 1/2 C'],
    ['let a = ((b*c))', 'let a = b*c'],
    ['let a = (2*b)/c', 'let a = 2*b/c'],
    ['let a = 2*(b/c)', 'let a = 2*(b/c)'],
    ['let a = -(b^2)', 'let a = -b^2'],
    ['let a = (-b)^2', 'let a = (-b)^2'],
    ['let a = b - (c - d)', 'let a = b - (c - d)'],
    ['let a = 2^(3^4)', 'let a = 2^3^4'],
    ['let a = (2*b) /s', 'let a = (2*b) /s'],
    ['let a = 1/h', 'let a = 1 /h'],
    ['A -> B | law = 2 uM/s*A', 'A -> B | law = (2 uM/s)*A'],
    ['A -> B | law = A*2/s', 'A -> B | law = A*2/s'],
    ['weight X = min(n,3)', 'weight X = min(n, 3) in n'],
    ['A -> B \\\n | k \\\n | goes \\\n  on', 'A -> B | k | goes on'],
  ])('%s is printed as %s', (text, printed) => {
    expect(print(text)).toBe(`${printed}\n`);
  });

  test('a line with an error is printed as it is written', () => {
    const { tree } = parseNetwork('A -> B\n  A => (B # why\nB -> C');
    expect(printNetwork(tree)).toBe('A -> B\nA => (B  # why\nB -> C\n');
  });
});

describe('canonical text', () => {
  test('does not depend on comments, blank lines, notes and spaces', () => {
    fc.assert(
      fc.property(networkText, (text) => {
        const { tree } = parseNetwork(text);
        const bare = tree.lines
          .filter((line) => line.kind !== 'blank')
          .map((line) => (line.kind === 'row' ? { ...line, note: 'another note' } : line))
          .map((line) => ({ ...line, comment: 'another comment' }));
        const disguised = `# head\n\n${printNetwork({ lines: bare })}\n\n`;
        expect(canonicalText(disguised)).toBe(canonicalText(text));
      }),
      seeded,
    );
  });

  test('is not to be had of a text with a syntax error', () => {
    expect(canonicalText('A -> B\nA => B')).toBeNull();
    expect(canonicalText('# nothing\n')).toBe('');
  });
});
