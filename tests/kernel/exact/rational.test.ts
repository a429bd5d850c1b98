import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import {
  add,
  compare,
  divide,
  equals,
  formatRational,
  fromDouble,
  isZero,
  multiply,
  parseRational,
  power,
  rational,
  rationalForResult,
  subtract,
  toDouble,
} from '../../../packages/kernel/src/exact/index.ts';

const rationals = fc
  .tuple(fc.bigInt({ min: -(10n ** 25n), max: 10n ** 25n }), fc.bigInt({ min: 1n, max: 10n ** 20n }))
  .map(([numerator, denominator]) => rational(numerator, denominator));

describe('rational numbers', () => {
  test('are kept in lowest terms with a positive denominator', () => {
    expect(rational(6n, -4n)).toEqual({ numerator: -3n, denominator: 2n });
    expect(rational(0n, -7n)).toEqual({ numerator: 0n, denominator: 1n });
    expect(() => rational(1n, 0n)).toThrow(/denominator/);
  });

  test('form a field', () => {
    fc.assert(
      fc.property(rationals, rationals, rationals, (a, b, c) => {
        expect(equals(add(a, b), add(b, a))).toBe(true);
        expect(equals(multiply(a, add(b, c)), add(multiply(a, b), multiply(a, c)))).toBe(true);
        expect(equals(subtract(add(a, b), b), a)).toBe(true);
        if (!isZero(b)) expect(equals(multiply(divide(a, b), b), a)).toBe(true);
        expect(compare(a, b)).toBe(-compare(b, a) + 0);
      }),
      { seed: 20261201 },
    );
  });

  test('are read and written exactly', () => {
    fc.assert(
      fc.property(rationals, (a) => {
        expect(equals(parseRational(formatRational(a))!, a)).toBe(true);
      }),
      { seed: 20261201 },
    );
    expect(parseRational('0.1')).toEqual({ numerator: 1n, denominator: 10n });
    expect(parseRational('2.50e-1')).toEqual({ numerator: 1n, denominator: 4n });
    expect(parseRational('-1e3')).toEqual({ numerator: -1000n, denominator: 1n });
    for (const text of ['', 'x', '1/0', '1.2.3', '0x10', '1/-2']) expect(parseRational(text)).toBeNull();
  });

  test('hold the exact value of every double', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const exact = fromDouble(value);
        if (Math.abs(value) > 1e-290 || value === 0) expect(toDouble(exact)).toBe(value + 0);
      }),
      { seed: 20261201 },
    );
    expect(fromDouble(0.1)).not.toEqual(parseRational('0.1'));
    expect(() => fromDouble(Infinity)).toThrow(/exact/);
  });

  test('become a number in results only where that loses nothing', () => {
    expect(rationalForResult(rational(7n))).toBe(7);
    expect(rationalForResult(rational(3n, 2n))).toBe('3/2');
    expect(rationalForResult(rational(2n ** 53n - 1n))).toBe(2 ** 53 - 1);
    expect(rationalForResult(rational(2n ** 53n))).toBe('9007199254740992');
  });

  test('turn into doubles beyond their range of exponents', () => {
    expect(toDouble(rational(10n ** 400n, 10n ** 399n + 1n))).toBeCloseTo(10, 12);
    expect(power(rational(2n, 3n), -2)).toEqual({ numerator: 9n, denominator: 4n });
  });
});
