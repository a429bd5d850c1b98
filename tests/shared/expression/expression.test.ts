import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  applyFunction,
  evaluate,
  exactValue,
  freeNames,
  printExpression,
} from '@stillroom/shared/expression';
import type { Expression } from '@stillroom/shared/expression';
import { rational } from '@stillroom/shared/network';
import { readNetwork } from '@stillroom/shared/notation';

/** The expression of a text, by way of an output over time. */
function read(text: string): Expression {
  const { network, complaints } = readNetwork(`A + B -> C\nlet a = 2\nlet out = 0*t + (${text})`);
  const sum = network?.outputs[0]?.expression;
  if (sum?.kind !== 'binary') throw new Error(complaints.map(({ message }) => message).join('\n'));
  return sum.right;
}

const values: Readonly<Record<string, number>> = { A: 3, B: 0.5, C: -2, a: 2, t: 10 };
const value = (text: string) => evaluate(read(text), (name) => values[name] ?? NaN);

describe('expressions', () => {
  test.each([
    ['1 + 2*3 - 4/8', 6.5],
    ['-A^2', -9],
    ['2^3^2', 512],
    ['2^-1', 0.5],
    ['7 % 3 + (-1) % 3', 3],
    ['-5 % 3', 1],
    ['A > 2 and not B > 1', 1],
    ['A < 2 or B == 0.5', 1],
    ['if(A >= 3, 1, 2) + if(A != 3, 1, 2)', 3],
    ['min(A, B, C) + max(A, B)', 1],
    ['abs(C) + floor(-0.5) + ceil(0.2) + round(2.5)', 4],
    ['hill(A, 3, 4)', 0.5],
    ['ln(exp(1))', 1],
    ['sum(i = 1..4, i*A)', 30],
    ['C % 0', NaN],
    ['1/0', Infinity],
  ])('%s is %d', (text, wanted) => {
    expect(value(text)).toBe(wanted);
  });

  test('hill and if are functions of numbers as well', () => {
    expect(applyFunction('if', [0, 1, 2])).toBe(2);
    expect(applyFunction('hill', [2, 2, 1])).toBe(0.5);
  });

  test('names are listed once, in order of use', () => {
    expect(freeNames(read('B*A + exp(B) - if(t > a, C, A)'))).toEqual(['B', 'A', 't', 'a', 'C']);
  });

  test('what is printed is read as the same expression', () => {
    for (const text of [
      'a - (A - B)',
      '(a + A)*B/(C*a)',
      '-(a + A)',
      '(-a)^2',
      'not (A > 1 and B < 2) or C == 1',
      '(A < 1) + 2',
    ]) {
      expect(read(printExpression(read(text)))).toEqual(read(text));
    }
  });

  test('fractions and negative numbers are bracketed where they must be', () => {
    const half: Expression = { kind: 'number', value: 0.5, text: '1/2' };
    const minus: Expression = { kind: 'number', value: -2, text: '-2' };
    const power = (base: Expression): Expression => ({
      kind: 'binary',
      operator: '^',
      left: base,
      right: half,
    });
    expect(printExpression(power(half))).toBe('(1/2)^(1/2)');
    expect(printExpression(power(minus))).toBe('(-2)^(1/2)');
  });
});

describe('exact values', () => {
  const exact = (text: string) => {
    const result = exactValue(read(text), (name) => (name === 'a' ? rational.ofInteger(2) : null));
    return result && rational.print(result);
  };

  test.each([
    ['0.1 + 0.2', '3/10'],
    ['a^10/3', '1024/3'],
    ['(1/3)^-2', '9'],
    ['-(1/7) - 1/7', '-2/7'],
    ['A + 1', null],
    ['exp(0)', null],
    ['1/(a - 2)', null],
    ['2^0.5', null],
    ['9^9^9', null],
    ['0^-1', null],
  ])('%s is %s', (text, wanted) => {
    expect(exact(text)).toBe(wanted);
  });

  test('agree with doubles where doubles are exact', () => {
    const small = fc.integer({ min: -1000, max: 1000 });
    fc.assert(
      fc.property(small, small, small, (x, y, z) => {
        const text = `(${x})*(${y}) - (${z})*a + (${x})^2`;
        expect(exact(text)).toBe(String(x * y - z * 2 + x * x + 0));
      }),
      { seed: 20261201 },
    );
  });
});
