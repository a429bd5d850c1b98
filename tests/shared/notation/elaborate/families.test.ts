import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { readNetwork } from '@stillroom/shared/notation';
import { seeded } from '../texts.ts';
import { complexTexts, networkOf, reactionTexts, valuesOf, warningsOf } from './reading.ts';

describe('families', () => {
  test('write the row for every index, the last one running fastest', () => {
    const network = networkOf('let L = 3\n[i = 1..L] X[i] <=> X[i % L + 1] | p, q');
    expect(reactionTexts(network)).toEqual([
      'X[1] -> X[2] | p',
      'X[2] -> X[1] | q',
      'X[2] -> X[3] | p',
      'X[3] -> X[2] | q',
      'X[3] -> X[1] | p',
      'X[1] -> X[3] | q',
    ]);
    expect(network.rows).toEqual([{ line: 2, note: '', reactions: 6, family: true }]);
  });

  test('bounds may use indices before them, and where picks members', () => {
    const network = networkOf('[i = 1..4, j = i+1..4 where (i + j) % 2 == 0] A[i,j] -> B[j-i]');
    expect(reactionTexts(network)).toEqual(['A[1,3] -> B[2] | k1', 'A[2,4] -> B[2] | k1']);
  });

  test('an empty range writes nothing', () => {
    const network = networkOf('[i = 1..0] X[i] -> 0 | p\nA -> 0 | q');
    expect(reactionTexts(network)).toEqual(['A -> 0 | q']);
    expect(network.species).toEqual(['A']);
  });

  test('% is never negative', () => {
    expect(networkOf('[i = 0..3] X[(i - 1) % 4] -> 0').species).toEqual(['X[3]', 'X[0]', 'X[1]', 'X[2]']);
  });

  test('constants with an index are one per member', () => {
    const network = networkOf('[i = 1..3] X[i] -> 0 | p[i]\nlet p[i] = 1/i for i = 1..3');
    expect(valuesOf(network)).toEqual({ 'p[1]': 1, 'p[2]': 0.5, 'p[3]': 1 / 3 });
    expect(reactionTexts(network)[2]).toBe('X[3] -> 0 | p[3]');
  });

  test('members whose sides become equal are added up or left out with a warning', () => {
    expect(complexTexts(networkOf('[i = 1..2, j = 1..2] X[i] + X[j] -> 0'))).toEqual([
      '2 X[1]',
      '0',
      'X[1] + X[2]',
      '2 X[2]',
    ]);
    const text = '[i = 1..3] X[i] -> X[2]';
    expect(networkOf(text).reactions.count).toBe(2);
    expect(warningsOf(text)).toEqual(['One reaction of this family has equal sides and is left out.']);
  });

  test('starts, fixed values, weights and outputs come in families', () => {
    const network = networkOf(
      [
        '[i = 1..3] X[i] -> Y[i]',
        'start X[i] = i*2 for i = 1..2, Y[1] = 7',
        'fix X[3] = 1',
        'weight Y[i] = 1 + i/n in n for i = 1..3 where i != 2',
        'let total = sum(i = 1..3, X[i])',
        'let Z[i] = X[i]/Y[i] for i = 1..3',
      ].join('\n'),
    );
    const named = <T>(map: ReadonlyMap<number, T>) =>
      [...map].map(([i, value]) => [network.species[i], value]);
    expect(
      named(network.start).map(([name, quantity]) => [name, (quantity as { value: number }).value]),
    ).toEqual([
      ['X[1]', 2],
      ['X[2]', 4],
      ['Y[1]', 7],
    ]);
    expect(named(network.fixed)).toHaveLength(1);
    expect(named(network.weights).map(([name]) => name)).toEqual(['Y[1]', 'Y[3]']);
    expect(network.outputs.map(({ name }) => name)).toEqual(['total', 'Z[1]', 'Z[2]', 'Z[3]']);
  });

  test('a member outside the range is refused', () => {
    const messages = (text: string) => readNetwork(text).complaints.map(({ message }) => message);
    expect(messages('[i = 1..3] X[i] -> 0\nstart X[4] = 1')).toEqual(['X[4] occurs in no row.']);
    expect(messages('[i = 1..3] X[i] -> 0 | law = X[i+1]')).toEqual(['X[4] occurs in no row.']);
  });

  test('a family is what its members written out are', () => {
    const bound = fc.integer({ min: 0, max: 6 });
    fc.assert(
      fc.property(bound, bound, fc.integer({ min: 1, max: 5 }), (first, last, period) => {
        const family = `[i = ${first}..${last}] X[i] + 2 Y -> Y + X[(i + 2) % ${period}] | p`;
        const members: string[] = [];
        for (let i = first; i <= last; i += 1) {
          const to = (i + 2) % period;
          members.push(`X[${i}] + 2 Y -> Y + X[${to}] | p`);
        }
        const short = networkOf(family);
        const long = networkOf(members.join('\n'));
        expect(reactionTexts(short)).toEqual(reactionTexts(long));
        expect(short.species).toEqual(long.species);
      }),
      seeded,
    );
  });

  test('names with many and with negative indices are told apart', () => {
    const network = networkOf('[i = -20..20, j = -20..20] X[i,j] -> Y[i*1000 + j]');
    expect(new Set(network.species).size).toBe(2 * 41 * 41);
    expect(network.species).toHaveLength(2 * 41 * 41);
  });
});
