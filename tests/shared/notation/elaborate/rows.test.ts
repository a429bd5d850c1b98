import { describe, expect, test } from 'vitest';
import { complexTexts, networkOf, reactionTexts, valuesOf, warningsOf } from './reading.ts';

describe('rows', () => {
  test('species and complexes stand in order of first appearance, backward after forward', () => {
    const network = networkOf('E + S <=> ES -> E + P\n0 <=> S\nP -> 0');
    expect(network.species).toEqual(['E', 'S', 'ES', 'P']);
    expect(complexTexts(network)).toEqual(['E + S', 'ES', 'E + P', '0', 'S', 'P']);
    expect(reactionTexts(network)).toEqual([
      'E + S -> ES | k1',
      'ES -> E + S | k2',
      'ES -> E + P | k3',
      '0 -> S | k4',
      'S -> 0 | k5',
      'P -> 0 | k6',
    ]);
    expect(Array.from(network.reactions.partner)).toEqual([1, 0, -1, 4, 3, -1]);
    expect(Array.from(network.reactions.row)).toEqual([0, 0, 0, 1, 1, 2]);
  });

  test('<- shows the reaction from right to left and takes one constant', () => {
    const network = networkOf('A <- B -> C | p, q');
    expect(network.species).toEqual(['A', 'B', 'C']);
    expect(reactionTexts(network)).toEqual(['B -> A | p', 'B -> C | q']);
  });

  test('A + A is 2 A, in any order of writing', () => {
    const network = networkOf('A + B + A -> C\nB + 2A -> D\n1/2 A + 0.25 A -> B');
    expect(complexTexts(network)).toEqual(['2 A + B', 'C', 'D', '3/4 A', 'B']);
  });

  test('a digit before a letter is a coefficient, not an exponent', () => {
    expect(complexTexts(networkOf('2E1 + 3 e2 -> 0'))).toEqual(['2 E1 + 3 e2', '0']);
  });

  test('equal rows keep every reaction and share their complexes', () => {
    const network = networkOf('A -> B | p\nA -> B | q\nA -> B | p');
    expect(network.complexes.count).toBe(2);
    expect(reactionTexts(network)).toEqual(['A -> B | p', 'A -> B | q', 'A -> B | p']);
    expect(network.rows.map(({ line, reactions }) => [line, reactions])).toEqual([
      [1, 1],
      [2, 1],
      [3, 1],
    ]);
  });

  test('an empty text is an empty network', () => {
    const network = networkOf('# nothing yet\n\n');
    expect([network.species.length, network.complexes.count, network.reactions.count]).toEqual([0, 0, 0]);
  });

  test('notes and lines are kept with their rows', () => {
    const { rows } = networkOf('\n# head\nA -> B | k | first \\\n goes on # why\nB -> C');
    expect(rows.map(({ line, note }) => [line, note])).toEqual([
      [3, 'first goes on'],
      [5, ''],
    ]);
  });

  test('names are the same in any normal form', () => {
    expect(networkOf('e\u0301 -> B\nstart \u00e9 = 3').species).toEqual(['\u00e9', 'B']);
  });
});

describe('constants', () => {
  test('are taken left to right, two for <=>, and named after the arrow where they have no name', () => {
    const network = networkOf('A <=> B -> C | 1, q = 2, 3\nC -> A\nA -> C | (1/3)');
    expect(reactionTexts(network)).toEqual([
      'A -> B | k1',
      'B -> A | q',
      'B -> C | k3',
      'C -> A | k4',
      'A -> C | k5',
    ]);
    expect(valuesOf(network)).toEqual({ k1: 1, q: 2, k3: 3, k4: null, k5: 1 / 3 });
    expect(network.constants[4]?.quantity?.exact).toEqual({ numerator: 1n, denominator: 3n });
  });

  test('a name in several rows is one constant with one value', () => {
    const network = networkOf('A -> B | k\nB -> C | k = 3\nlet q = 2*k\nC -> A | q');
    expect(valuesOf(network)).toEqual({ k: 3, q: 6 });
  });

  test('values are exact and rounded once', () => {
    const network = networkOf('let a = 0.1\nlet b = a + 0.2\nlet c = b^3/7\nlet e = exp(1)');
    expect(network.constants.map(({ quantity }) => quantity?.exact)).toEqual([
      { numerator: 1n, denominator: 10n },
      { numerator: 3n, denominator: 10n },
      { numerator: 27n, denominator: 7000n },
      null,
    ]);
    // 0.1 + 0.2 in doubles is 0.30000000000000004.
    expect(valuesOf(network)['b']).toBe(0.3);
    expect(valuesOf(network)['e']).toBe(Math.E);
  });

  test('a value that draws on one that is not given is not given', () => {
    expect(valuesOf(networkOf('A -> B | k\nlet q = 2*k'))).toEqual({ k: null, q: null });
  });

  test('values may be given last and in any order', () => {
    const lets = Array.from({ length: 3000 }, (_, i) => `let a${i} = a${i + 1} + 1`).join('\n');
    expect(valuesOf(networkOf(`${lets}\nlet a3000 = 0`))['a0']).toBe(3000);
  });

  test('a constant that is 0 stays in the structure, with a warning', () => {
    expect(warningsOf('A -> B | k = 0')).toEqual(['k is 0.']);
    expect(networkOf('A -> B | k = 0').reactions.count).toBe(1);
  });
});
