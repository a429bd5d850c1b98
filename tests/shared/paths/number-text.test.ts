import { numberText, reduceNumbers, unitText, valueAt } from '@stillroom/shared/paths';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';

describe('numbers as words', () => {
  test.each([
    [0, {}, '0'],
    [12345678, {}, '12345678'],
    [-3, {}, '−3'],
    [0.5, {}, '0.5'],
    [1 / 3, {}, '0.3333'],
    [1234.5678, {}, '1235'],
    [123456.78, {}, '123500'],
    [1.5e-9, {}, '1.5 × 10⁻⁹'],
    [2.5e12 + 0.5, {}, '2.5 × 10¹²'],
    [9.996, { digits: 3 }, '10.0'],
    [98765, { digits: 2 }, '99000'],
    [0.00012345, { digits: 3 }, '0.000123'],
    [0, { digits: 3 }, '0.00'],
    [5, { digits: 3 }, '5.00'],
    [3.14159, { decimals: 2 }, '3.14'],
    [-0.001, { decimals: 1 }, '−0.0'],
    [1234, { scientific: true, digits: 3 }, '1.23 × 10³'],
    [1234, { scientific: true }, '1.234 × 10³'],
    [Number.NaN, {}, 'not a number'],
  ])('%d %j is %s', (value, style, text) => expect(numberText(value, style)).toBe(text));

  test('read back, they are the number rounded to its digits', () => {
    const plain = (text: string) =>
      Number(
        text
          .replace(
            / × 10([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)/u,
            (_, power: string) =>
              `e${[...power].map((sign) => ('⁰¹²³⁴⁵⁶⁷⁸⁹'.includes(sign) ? '⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(sign) : '-')).join('')}`,
          )
          .replace('−', '-'),
      );
    fc.assert(
      fc.property(
        fc.double({ noNaN: true, noDefaultInfinity: true }),
        fc.integer({ min: 1, max: 15 }),
        (value, digits) => {
          expect(plain(numberText(value, { digits }))).toBe(Number(value.toPrecision(digits)) + 0);
        },
      ),
      { seed: 20261201, numRuns: 500 },
    );
  });

  test('units are set with their sign', () => {
    expect(['uM', '/uM/s', 'uL', 'mol/L', 'cu'].map(unitText)).toEqual(['µM', '/µM/s', 'µL', 'mol/L', 'cu']);
  });
});

describe('one number of a list', () => {
  test('the spread of a sample, against its definition', () => {
    expect(reduceNumbers('sd', [2, 4, 4, 4, 5, 5, 7, 9])).toBeCloseTo(Math.sqrt(32 / 7), 14);
    expect(reduceNumbers('sd', [1e9 + 1, 1e9 + 2, 1e9 + 3])).toBe(1);
    expect(reduceNumbers('sd', [5])).toBe(0);
  });
  test('first, last, least, most, sum, mean', () => {
    const values = [3, -1, 4];
    expect(
      (['first', 'last', 'min', 'max', 'sum', 'mean'] as const).map((how) => reduceNumbers(how, values)),
    ).toEqual([3, 4, -1, 4, 6, 2]);
  });
  test('a course between its points, and outside', () => {
    expect([0, 1, 1.5, 2, 2.1, -1].map((time) => valueAt([0, 1, 2], [0, 10, 30], time))).toEqual([
      0,
      10,
      20,
      30,
      null,
      null,
    ]);
  });
});
