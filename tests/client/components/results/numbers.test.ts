import { describe, expect, test } from 'vitest';
import {
  numberText,
  setNumber,
  tookText,
  unitText,
} from '../../../../packages/client/src/components/results/numbers.ts';

describe('numbers as they are set', () => {
  test.each([
    [0, '0'],
    [0.16, '0.16'],
    [0.0004, '0.0004'],
    [-0.693147, '−0.6931'],
    [310.8309, '310.8'],
    [240, '240'],
    [123456, '123\u202f456'],
    [1e7, '10⁷'],
    [5.06e-5, '5.06 × 10⁻⁵'],
    [-1e-9, '−10⁻⁹'],
  ])('%d reads %s', (value, text) => expect(numberText(value)).toBe(text));

  test('an undecided number says so', () => expect(numberText(null)).toBe('undecided'));

  test('digits are significant ones, zeros behind the point are dropped', () => {
    expect(setNumber(2.5, 3)).toEqual({ digits: '2.5', exponent: null });
    expect(setNumber(0.12345678, 6)).toEqual({ digits: '0.123457', exponent: null });
  });
});

test.each([
  ['/s', 's⁻¹'],
  ['/uM/s', 'µM⁻¹ s⁻¹'],
  ['uM/s', 'µM s⁻¹'],
  ['/uM^2/s', 'µM⁻² s⁻¹'],
  ['uM^-1 s^-1', 'µM⁻¹ s⁻¹'],
  [null, ''],
])('the unit %s is set as %s', (unit, text) => expect(unitText(unit)).toBe(text));

test.each([
  [3, '0.01 s'],
  [110, '0.11 s'],
  [2_700, '2.7 s'],
  [41_000, '41 s'],
  [180_000, '3 min'],
])('%d ms took %s', (ms, text) => expect(tookText(ms)).toBe(text));
