import { readNetwork } from '@stillroom/shared/notation';
import { describe, expect, test } from 'vitest';
import { networkOf, reactionTexts, valuesOf } from './reading.ts';

const messagesOf = (text: string) => readNetwork(text).complaints.map(({ message }) => message);

describe('constants of a law in its own row', () => {
  test('are defined after the law, with their own units', () => {
    const network = networkOf(
      'S -> P | law = Vmax*S/(Km + S), Vmax = 3 uM/s, Km = 12000 nM | saturates\nstart S = 5 uM',
    );
    expect(valuesOf(network)).toEqual({ Vmax: 3, Km: 12 });
    expect(network.constants.map(({ unit }) => unit)).toEqual(['uM/s', 'uM']);
    expect(network.laws.length).toBe(1);
    expect(network.rows[0]?.note).toBe('saturates');
  });

  test('without value are those that are defined elsewhere', () => {
    const network = networkOf(
      'S -> P | law = V*S/(K + S), V, K\nP -> S | law = V*P/(K + P), V = 2\nlet K = 3',
    );
    expect(valuesOf(network)).toEqual({ V: 2, K: 3 });
  });

  test('may stand before the law, and beside the rate constants of other arrows', () => {
    expect(valuesOf(networkOf('S -> P | V = 3, law = V*S/(1 + S)'))).toEqual({ V: 3 });
    const chain = networkOf('A -> B -> C | k = 2, law = v*B/(1 + B), v = 5');
    expect(reactionTexts(chain)).toEqual(['A -> B | k', 'B -> C']);
    expect(valuesOf(chain)).toEqual({ k: 2, v: 5 });
  });

  test('a rate constant may be used in a law of its row too', () => {
    const network = networkOf('A -> B -> C | k = 2, law = k*B/(1 + B)');
    expect(reactionTexts(network)).toEqual(['A -> B | k', 'B -> C']);
  });

  test('serve net laws', () => {
    const network = networkOf('S <=> P | net = v*(S - P/q), v = 2, q = 4');
    expect(valuesOf(network)).toEqual({ v: 2, q: 4 });
    expect(network.laws[0]?.net).toBe(true);
  });

  test('may be negative, for they are no rate constants', () => {
    expect(valuesOf(networkOf('S -> P | law = S*exp(a), a = (-1)'))).toEqual({ a: -1 });
  });

  test('one for each member of a family', () => {
    const network = networkOf('[i = 1..3] X[i] -> Y[i] | law = v[i]*X[i]/(1 + X[i]), v[i] = (2*i)');
    expect(valuesOf(network)).toEqual({ 'v[1]': 2, 'v[2]': 4, 'v[3]': 6 });
  });

  test('get their value once', () => {
    expect(messagesOf('S -> P | law = v*S/(1 + S), v = 1\nP -> S | law = v*P/(1 + P), v = 2')).toEqual([
      'v already has a value in line 1.',
    ]);
  });

  test('that no law of the row uses are one too many', () => {
    expect(messagesOf('S -> P | law = v*S/(1 + S), v = 1, w = 2')).toEqual([
      'This row takes one constant, 2 are given.',
    ]);
    expect(messagesOf('A -> B -> C | law = v*A/(1 + A), v = 1, k = 3, w = 2')).toHaveLength(1);
  });

  test('cannot change in time', () => {
    expect(messagesOf('S -> P | law = v*S/(1 + S), v = S')).toHaveLength(1);
  });
});
