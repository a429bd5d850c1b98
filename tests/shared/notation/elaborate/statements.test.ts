import { describe, expect, test } from 'vitest';
import { printExpression } from '@stillroom/shared/expression';
import { networkOf, valuesOf, warningsOf } from './reading.ts';

describe('statements', () => {
  test('a let of constants is a constant, a let of species or time an output, also at second hand', () => {
    const network = networkOf(
      'A -> B | k = 2\nlet a = 2*k\nlet b = a*A\nlet c = b + 1\nlet e = t\nlet f = a + 1',
    );
    expect(valuesOf(network)).toEqual({ k: 2, a: 4, f: 5 });
    expect(network.outputs.map(({ name, expression }) => `${name} = ${printExpression(expression)}`)).toEqual(
      ['b = a*A', 'c = b + 1', 'e = t'],
    );
  });

  test('fixed species keep their place in the network; the kernel reduces', () => {
    const network = networkOf('A + X -> 2 X\nX -> 0\nfix A = 3');
    expect(network.species).toEqual(['A', 'X']);
    expect([...network.fixed].map(([i, { value }]) => [i, value])).toEqual([[0, 3]]);
    expect(network.complexes.count).toBe(4);
  });

  test('a species with a rate of its own comes in no row and stands in its place', () => {
    const network = networkOf('A -> B | law = 2*W*A\nrate W = -W + A\nC -> A');
    expect(network.species).toEqual(['A', 'B', 'W', 'C']);
    expect([...network.rateRules].map(([i, rate]) => [i, printExpression(rate)])).toEqual([[2, '-W + A']]);
  });

  test('events', () => {
    const network = networkOf('A -> B | k = 1\n\nevent when t > 3 and not A < 1: A = A + 2, k = 5');
    expect(
      network.events.map(({ line, when, set }) => [
        line,
        printExpression(when),
        set.map(({ name, value }) => `${name} = ${printExpression(value)}`),
      ]),
    ).toEqual([[3, 't > 3 and not A < 1', ['A = A + 2', 'k = 5']]]);
  });

  test('weights are expressions in n and constants', () => {
    const network = networkOf('X -> Y\nlet b = 3\nweight X = 1 + b/n in n\nweight Y = min(n, 3) in n');
    expect([...network.weights.values()].map(printExpression)).toEqual(['1 + b/n', 'min(n, 3)']);
  });

  test('n is a name like any other outside weights', () => {
    expect(valuesOf(networkOf('A -> B | n = 3'))).toEqual({ n: 3 });
  });
});

describe('laws', () => {
  const lawsOf = (text: string) => {
    const network = networkOf(text);
    return network.laws.map(({ expression, net, massAction }) => ({
      law: printExpression(expression),
      net,
      massAction: massAction === null ? null : network.constants[massAction]?.name,
    }));
  };

  test('replace mass action arrow by arrow', () => {
    const network = networkOf('A <=> B -> C | law = A/(1 + A), q = 2, law = B^2');
    expect(Array.from(network.reactions.law)).toEqual([0, -1, 1]);
    expect(Array.from(network.reactions.constant)).toEqual([-1, 0, -1]);
  });

  test('a net law stands on the forward arrow, the zero law on the backward one', () => {
    const network = networkOf('A <=> B | net = A - B\nB -> C | k = 1');
    expect(Array.from(network.reactions.law)).toEqual([0, 1, -1]);
    expect(network.laws[0]?.net).toBe(true);
    expect(network.laws[1]).toEqual({
      expression: { kind: 'number', value: 0, text: '0' },
      net: false,
      massAction: null,
    });
  });

  test.each([
    ['2 A + B -> C | law = k*A^2*B\nlet k = 3', 'k'],
    ['2 A + B -> C | law = A*k*B*A\nlet k = 3', 'k'],
    ['0 -> C | law = k\nlet k = 3', 'k'],
    ['A -> B | law = 2*A', 'k1'],
    ['2 A + B -> C | law = k*A*B\nlet k = 3', null],
    ['A -> B | law = 2*k*A\nlet k = 3', null],
    ['A -> B | law = k*A/(1 + A)\nlet k = 3', null],
    ['A -> B | law = k*A*t\nlet k = 3', null],
  ])('%s is mass action of %s', (text, constant) => {
    expect(lawsOf(text)[0]?.massAction).toBe(constant);
  });

  test('a number that is recognised as mass action is a constant of its own', () => {
    expect(valuesOf(networkOf('A -> B | law = 2*A'))).toEqual({ k1: 2 });
  });

  test('sums are written out, indices resolved', () => {
    expect(lawsOf('[i = 1..3] X[i] -> 0 | law = sum(j = 1..3, X[j]*j)/i')[1]?.law).toBe(
      '(X[1]*1 + X[2]*2 + X[3]*3)/2',
    );
  });

  test('a law that is zero on zero constants is no matter of warnings', () => {
    expect(warningsOf('A -> B | law = 0*A')).toEqual([]);
  });
});
