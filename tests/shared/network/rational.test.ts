import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { rational } from '@stillroom/shared/network';

const seeded = { seed: 20261201, numRuns: 1000 };
const integer = fc.bigInt({ min: -(10n ** 40n), max: 10n ** 40n });
const positive = fc.bigInt({ min: 1n, max: 10n ** 40n });
const anyRational = fc.tuple(integer, positive).map(([above, below]) => rational.quotient(above, below));

describe('exact rationals', () => {
  test('are in lowest terms with a positive denominator', () => {
    expect(rational.quotient(6n, -4n)).toEqual({ numerator: -3n, denominator: 2n });
    expect(rational.quotient(0n, -7n)).toEqual({ numerator: 0n, denominator: 1n });
    expect(() => rational.quotient(1n, 0n)).toThrow(RangeError);
  });

  test('obey the laws of a field', () => {
    const { add, multiply, subtract, divide, equal } = rational;
    fc.assert(
      fc.property(anyRational, anyRational, anyRational, (a, b, c) => {
        expect(equal(multiply(a, add(b, c)), add(multiply(a, b), multiply(a, c)))).toBe(true);
        expect(equal(add(subtract(a, b), b), a)).toBe(true);
        if (b.numerator !== 0n) expect(equal(multiply(divide(a, b), b), a)).toBe(true);
        expect(Math.sign(rational.compare(a, b))).toBe(-Math.sign(rational.compare(b, a)) + 0);
      }),
      seeded,
    );
  });

  test('a double keeps its value there and back', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(rational.toNumber(rational.ofNumber(value))).toBe(value === 0 ? 0 : value);
      }),
      seeded,
    );
  });

  test('a decimal becomes the double that JavaScript reads it as', () => {
    const decimal = fc
      .tuple(fc.bigInt({ min: 0n, max: 10n ** 30n }), fc.integer({ min: -340, max: 290 }))
      .map(([digits, exponent]) => `${digits}e${exponent}`);
    fc.assert(
      fc.property(decimal, (text) => {
        const exact = rational.ofDecimal(text);
        expect(exact && rational.toNumber(exact)).toBe(Number(text));
      }),
      seeded,
    );
  });

  test.each([
    ['0.25', '1/4'],
    ['-1.5e-3', '-3/2000'],
    ['.5', '1/2'],
    ['3.', '3'],
    ['1e3', '1000'],
  ])('%s is %s', (text, wanted) => {
    const exact = rational.ofDecimal(text);
    expect(exact && rational.print(exact)).toBe(wanted);
  });

  test.each(['', '.', 'e3', '1e', 'x', '1e9999', '0x10', '1 2'])('%j is no decimal', (text) => {
    expect(rational.ofDecimal(text)).toBeNull();
  });

  test('halves between two doubles go to the even one', () => {
    const half = (value: bigint) => rational.toNumber(rational.quotient(2n * value + 1n, 2n));
    expect(half(2n ** 53n)).toBe(2 ** 53);
    expect(half(2n ** 53n + 2n)).toBe(2 ** 53 + 2);
    const between = rational.quotient(3n, 2n ** 1075n);
    expect(rational.toNumber(between)).toBe(2 * 5e-324);
    expect(rational.toNumber(rational.quotient(1n, 2n ** 1075n))).toBe(0);
  });
});
