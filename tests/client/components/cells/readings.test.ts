import { describe, expect, test } from 'vitest';
import {
  namedNumbersReading,
  numberReading,
  numbersReading,
} from '../../../../packages/client/src/components/cells/fields/readings.ts';

describe('what is typed into fields', () => {
  test('an empty field takes the setting away', () => {
    expect(numberReading.read('  ')).toBeUndefined();
    expect(namedNumbersReading.read('')).toBeUndefined();
    expect(numbersReading.read('')).toBeUndefined();
  });

  test('numbers as people write them', () => {
    expect(numberReading.read('1e-9')).toBe(1e-9);
    expect(numberReading.read('0,5')).toBe(0.5);
    expect(numberReading.read('−2')).toBe(-2);
    expect(numberReading.read('14 400')).toBe(14_400);
  });

  test('what is no number is refused with its own words', () => {
    expect(() => numberReading.read('fast')).toThrow('“fast” is not a number.');
    expect(() => numberReading.read('1e999')).toThrow('is not a number');
  });

  test('named numbers, indexed names too', () => {
    expect(namedNumbersReading.read('A = 80, X[1,2] = 1.5')).toEqual({ A: 80, 'X[1,2]': 1.5 });
    expect(() => namedNumbersReading.read('A 80')).toThrow('is not a name with a number');
    expect(() => namedNumbersReading.read('A = 1 = 2')).toThrow('is not a name with a number');
  });

  test('what is printed reads back as it was', () => {
    const value = { A: 80, 'X[1,2]': 1e-9 };
    expect(namedNumbersReading.read(namedNumbersReading.print(value))).toEqual(value);
    expect(numbersReading.read(numbersReading.print([0, 1.5, 60]))).toEqual([0, 1.5, 60]);
  });
});
