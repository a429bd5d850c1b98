import { describe, expect, test } from 'vitest';
import { canonicalText, parseNetwork, printNetwork, readNetwork } from '@stillroom/shared/notation';

const many = (text: string, count: number) => text.repeat(count);

/** Texts meant to overflow, stall or mislead the reader; each must end with an answer or a complaint. The list grows. */
const attacks: readonly (readonly [string, string])[] = [
  ['100,000 open brackets', `A -> B | k = ${many('(', 100_000)}`],
  ['100,000 matched brackets', `A -> B | law = ${many('(', 100_000)}A${many(')', 100_000)}`],
  ['100,000 signs', `let a = ${many('-', 100_000)}1`],
  ['100,000 nots', `let a = ${many('not ', 100_000)}1`],
  ['a tower of powers', `let a = ${many('2^', 100_000)}2`],
  ['powers without end', 'let a = 9^9^9^9^9'],
  ['a long sum', `let a = 1${many(' + 1', 100_000)}`],
  ['nested calls', `let a = ${many('exp(', 50_000)}1`],
  ['nested ifs', `let a = ${many('if(1, 2, ', 50_000)}3`],
  ['nested sums of a million terms', 'let a = sum(i = 1..1000, sum(j = 1..1000, i*j))'],
  ['a sum of 10^12 terms', 'let a = sum(i = 1..1000000, j = 1..1000000, i)'],
  ['nested indices', `X${many('[X', 50_000)} -> 0`],
  ['a name of a million letters', `${many('A', 1_000_000)} -> B`],
  ['a side of 100,000 terms', `${Array.from({ length: 100_000 }, (_, i) => `A${i}`).join(' + ')} -> B`],
  ['a side of one species 100,000 times', `${many('A + ', 100_000)}A -> B`],
  ['a chain of 50,000 arrows', `A0${Array.from({ length: 50_000 }, (_, i) => ` -> A${i + 1}`).join('')}`],
  ['a row of 100,000 constants', `A -> B | ${many('k, ', 100_000)}k`],
  ['2 MB of one line', many('A -> B | ', 230_000)],
  ['2 MB of prose', many('The quick brown fox jumps over the lazy dog.\n', 47_000)],
  ['2 MB of bars', many('|', 2_000_000)],
  ['2 MB of backslashes', many('\\\n', 1_000_000)],
  ['2 MB of newlines', many('\n', 2_000_000)],
  ['2 MB of returns', many('\r', 2_000_000)],
  ['NULs', `A\0 -> B\0\0 | k\0 = 1\0\n\0\0`],
  ['lone surrogates', '\ud800 -> A\nA\udc00 -> B | \udfff = 1 # \ud800\nA -> B | k | \udc00'],
  ['a number of a million digits', `A -> B | k = ${many('9', 1_000_000)}`],
  ['a fraction of a million digits', `A -> B | k = 0.${many('1', 1_000_000)}`],
  ['a coefficient of a million digits', `${many('9', 1_000_000)} A -> B`],
  ['an exponent beyond all bounds', 'A -> B | k = 1e999999999999'],
  ['an exponent below all bounds', 'A -> B | k = 1e-999999999999'],
  ['powers of a unit', 'A -> B | k = 2 s^99999999999'],
  ['a product of 100,000 units', `A -> B | k = 2${many(' uM', 100_000)}`],
  ['a family whose bounds are 10^18', '[i = 1..1000000000000000000] X[i] -> 0'],
  [
    'a family of six indices',
    `[${['a', 'b', 'c', 'e', 'f', 'q'].map((x) => `${x} = 1..1000`).join(', ')}] X[a] -> 0`,
  ],
  ['a family that a condition empties', '[i = 1..7000, j = 1..7000 where i > j and j > i] X[i] -> 0'],
  ['a family over a triangle of triangles', '[i = 1..10000, j = i..10000, m = j..10000] X[i] -> 0'],
  ['an index of 10^12', 'X[1000000000000] -> 0'],
  ['an index that divides by 0', '[i = 0..3] X[1 % i] -> 0'],
  ['an index to a huge power', '[i = 9..9] X[i^999999999] -> 0'],
  ['a let through itself', 'let a = a\nlet b = c\nlet c = b\n[i = 1..a] X[i] -> 0'],
  [
    'a chain of 20,000 lets, last first',
    Array.from({ length: 20_000 }, (_, i) => `let a${i} = a${i + 1} + 1`).join('\n'),
  ],
  [
    'a chain of 20,000 outputs',
    `A -> B\nlet b0 = A\n${Array.from({ length: 20_000 }, (_, i) => `let b${i + 1} = b${i} + 1`).join('\n')}`,
  ],
  [
    'lets that double their digits',
    `let a0 = 3\n${Array.from({ length: 60 }, (_, i) => `let a${i + 1} = a${i}*a${i}`).join('\n')}`,
  ],
  ['10,000 errors', many('A => B\n', 10_000)],
  [
    '10,000 unknown names',
    `A -> B\n${Array.from({ length: 10_000 }, (_, i) => `start Unknown${i} = 1`).join('\n')}`,
  ],
  [
    'names of the prototype',
    'constructor -> __proto__ | toString = 1, hasOwnProperty\nlet valueOf = 2\nstart constructor = 1',
  ],
  ['names that differ in normal form only', 'e\u0301 -> B | k = 1\nstart \u00e9 = 3'],
  ['text that runs right to left', 'א -> ב | מ = 1 | \u202e note'],
  ['a comment that hides a row', 'A -> B # \\\nB -> C'],
];

describe('hostile notations', () => {
  test.each(attacks)('%s', (_, text) => {
    const { network, complaints } = readNetwork(text);
    const isRefused = complaints.some(({ severity }) => severity === 'error');
    expect(network === null).toBe(isRefused);
    expect(complaints.length).toBeLessThanOrEqual(500);
    for (const { from, to, message } of complaints) {
      expect(from).toBeLessThanOrEqual(to);
      expect(to).toBeLessThanOrEqual(text.length);
      expect(message.length).toBeLessThan(2_000);
    }
    const canonical = network && canonicalText(text);
    if (canonical !== null) expect(canonicalText(printNetwork(parseNetwork(text).tree))).toBe(canonical);
  });
});
