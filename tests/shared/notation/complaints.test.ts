import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parseNetwork, readNetwork } from '@stillroom/shared/notation';
import type { Complaint } from '@stillroom/shared/notation';
import { anyText, networkText, seeded } from './texts.ts';

/** Line and column by counting newlines, the slow way. */
function slowPosition(text: string, offset: number): { line: number; column: number } {
  const lines = text.slice(0, offset).split(/\r\n|\r|\n/);
  return { line: lines.length, column: (lines.at(-1) ?? '').length + 1 };
}

function checkPlaces(text: string, complaints: readonly Complaint[]): void {
  for (const complaint of complaints) {
    const { from, to, line, column } = complaint;
    expect(from).toBeGreaterThanOrEqual(0);
    expect(to).toBeGreaterThanOrEqual(from);
    expect(to).toBeLessThanOrEqual(text.length);
    expect({ line, column }).toEqual(slowPosition(text, from));
    for (const repair of complaint.repairs) {
      expect(repair.to).toBeGreaterThanOrEqual(repair.from);
      expect(repair.to).toBeLessThanOrEqual(text.length);
    }
  }
  const starts = complaints.map(({ from }) => from);
  expect(starts).toEqual([...starts].sort((a, b) => a - b));
}

/** The text after the first repair of the first complaint that offers one. */
function repaired(text: string): string {
  const repair = readNetwork(text).complaints.flatMap((complaint) => complaint.repairs)[0];
  return repair ? text.slice(0, repair.from) + repair.insert + text.slice(repair.to) : text;
}

describe('complaints', () => {
  test('stand inside the text, on the line and column they say, whatever the text', () => {
    fc.assert(
      fc.property(fc.oneof(anyText, networkText), (text) => {
        checkPlaces(text, parseNetwork(text).complaints);
        checkPlaces(text, readNetwork(text).complaints);
      }),
      seeded,
    );
  });

  test('a network is read exactly where no error is told', () => {
    fc.assert(
      fc.property(networkText, (text) => {
        const { network, complaints } = readNetwork(text);
        expect(network === null).toBe(complaints.some(({ severity }) => severity === 'error'));
      }),
      seeded,
    );
  });

  test('an error on a line is told there and changes no other line', () => {
    const line = fc.constantFrom(
      'A -> ->',
      'A B -> C',
      '-> A',
      'A -> B | k = ',
      'let = 3',
      'start A',
      'A = B',
      '§',
    );
    fc.assert(
      fc.property(networkText, line, fc.nat(8), (text, broken, place) => {
        const lines = text.split(/\r?\n/).filter((each) => each !== '' && !each.includes('\\'));
        const at = Math.min(place, lines.length);
        const sound = lines.length - at;
        const spoilt = [...lines.slice(0, at), broken, ...lines.slice(at)].join('\n');
        const before = parseNetwork(lines.join('\n'));
        const after = parseNetwork(spoilt);
        expect(new Set(after.complaints.map((complaint) => complaint.line))).toEqual(
          new Set([at + 1, ...before.complaints.map((c) => (c.line > at ? c.line + 1 : c.line))]),
        );
        const kinds = (tree: typeof after.tree) => tree.lines.map(({ kind }) => kind);
        expect(kinds(after.tree).slice(0, at)).toEqual(kinds(before.tree).slice(0, at));
        if (sound > 0) expect(kinds(after.tree).slice(at + 1)).toEqual(kinds(before.tree).slice(at));
      }),
      seeded,
    );
  });

  test('errors in one row are told column by column and item by item', () => {
    const { complaints } = readNetwork('A => B | k = 2 foo, q = , r = 3 )\nC -> D | law = (C');
    expect(complaints.map(({ line, column }) => [line, column])).toEqual([
      [1, 3],
      [1, 16],
      [1, 25],
      [1, 33],
      [2, 18],
    ]);
  });

  test.each([
    ['A = B', 'A <=> B'],
    ['A => B', 'A -> B'],
    ['A <-> B', 'A <=> B'],
    ['A B', null],
    ['A + B', 'A + B -> 0'],
    ['A -> B | k = 2 sec', 'A -> B | k = 2 s'],
    ['A -> B | k = 2 hr', 'A -> B | k = 2 h'],
    ['A -> B | k = 2 /s\nstart A = 3 uM, B = 4', 'A -> B | k = 2 /s\nstart A = 3 uM, B = 4 uM'],
    ['A -> B | k = 2\nstart A = 3 uM', 'A -> B | k = 2 /s\nstart A = 3 uM'],
    ['A -> B | k = 2 uM/s\nstart A = 3 uM', 'A -> B | k = 2 /s\nstart A = 3 uM'],
    ['A <=> B | k', 'A <=> B | k, k2'],
    ['A -> B | k, q', 'A -> B | k'],
    ['[i = 1..4 where i % 2 = 0] X[i] -> Y', '[i = 1..4 where i % 2 == 0] X[i] -> Y'],
    ['Substrate -> P\nstart Substrat = 3', 'Substrate -> P\nstart Substrate = 3'],
    ['A -> B | law = Vmax*A\nlet Vmx = 3', 'A -> B | law = Vmx*A\nlet Vmx = 3'],
    ['A -> B | law = exq(A)', 'A -> B | law = exp(A)'],
    ['A -> B | law = if(A = 1, 2, 3)', 'A -> B | law = if(A == 1, 2, 3)'],
  ])('%s is repaired to %s', (text, wanted) => {
    expect(repaired(text)).toBe(wanted ?? text);
  });

  test.each([
    ['let start = 3', /start is a word of the notation/],
    ['exp -> B', /exp is a function/],
    ['t -> B', /t is the time/],
    ['A -> B | A', /A is a species in line 1 and cannot be a constant too/],
    ['A -> B\nlet A = 3', /A is a species in line 1/],
    ['0 + A -> B', /0 stands alone/],
    ['A + 0 -> B', /0 stands alone/],
    ['0 A -> B', /coefficient cannot be 0/],
    ['9007199254740993 A -> B', /too large/],
    ['A + B -> B + A', /equal/],
    ['A -> B | k = 1, q = 2', /takes one constant, 2 are given/],
    ['A -> B | net = A', /no <=>/],
    ['A -> B | k = 1\nB -> C | k = 2', /k already has a value in line 1/],
    ['A -> B | 1\nB -> C | k1', /would be k1, which line 2 uses/],
    ['A -> B | k = 1e400', /too large/],
    ['A -> B | k = 1e-400', /too small/],
    ['A -> B | k = -1', /cannot be negative/],
    ['A -> B\nstart A = 1, A = 2', /A already has a start/],
    ['A -> B\nstart A = 1\nfix A = 2', /A already has a start/],
    ['let a = b\nlet b = a', /defined through itself/],
    ['let a = 1/0', /not a finite number/],
    ['A -> B | law = q', /q is not known/],
    ['A -> B | law = sum(A)', /expected an index|Expected an index|Expected = /],
    ['A -> B | law = hill(A, 2)', /hill takes 3, not 2/],
    ['A -> B | law = A < B < 3', /cannot be chained/],
    ['A -> B\nvolume V = 3 s', /not a unit of volume/],
    ['A -> B\nvolume V = 1 fL\nin W: A', /No volume is called W/],
    ['A -> B\nvolume V = 1 fL\nin V: A, A', /placed twice/],
    ['A -> B\nrate A = 3', /occurs in a row/],
    ['A -> B\nweight A = n - 3 in n', /weight of A is -2 at n = 1/],
    ['A -> B\nweight A = m in m', /expression in n/],
    ['A -> B\nevent when t > 3: C = 4', /C is not known/],
    ['[i = 1..10000000] X[i] -> 0', /would write 10,000,000 reactions; the limit is 5,000,000/],
    ['[i = 1..100000, j = 1..100000] X[i,j] -> 0', /10,000,000,000/],
    ['[i = 1..3] X[i/2] -> 0', /whole number/],
    ['[i = 1..3, i = 1..2] X[i] -> 0', /given twice/],
    ['[i = 1..L] X[i] -> 0', /L has no whole number/],
    ['A -> A[1', /\] or another index/],
    ['A -> B | let = 3', /let is a word/],
    ['A -> B | k\nlet k = p[1/2]\nlet p[1] = 3', /whole number/],
    ['A -> B\nstart A = p[1/2]\nlet p[1] = 3 uM', /whole number/],
    ['A -> B | k = 2*A', /A changes in time/],
    ['A -> B\nvolume V = 2*A', /A changes in time/],
    ['A -> B | k\nvolume V = k', /V needs a value/],
    ['A -> B | k = 1/2 /h', /h is not known/],
    ['A -> B\nlet b = 2*A\nB -> A | b', /b changes in time/],
    ['A -> B | k = 2 /s\nB + C -> A | k', /k is in \/s, but B \+ C -> A is of order 2/],
  ])('%s is refused with %s', (text, message) => {
    const { network, complaints } = readNetwork(text);
    expect(network).toBeNull();
    expect(complaints.map((complaint) => complaint.message).join('\n')).toMatch(message);
  });

  test('a name in a line with an error is not called unknown', () => {
    expect(readNetwork('A => B\nstart B = 3').complaints).toHaveLength(1);
    expect(readNetwork('let L = (3\nlet q =\n[i = 1..L] X[i] -> 0 | law = q*X[i]').complaints).toHaveLength(
      2,
    );
  });
});
