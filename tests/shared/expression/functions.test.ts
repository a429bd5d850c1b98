import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { elementary } from '@stillroom/shared/expression';

/**
 * Values to the nearest double, computed by mpmath 1.3 with 1300 bits: arguments, then value. They cover small and huge
 * arguments, the neighbourhood of 1, and multiples of π/2.
 */
const reference = JSON.parse(
  readFileSync(new URL('./elementary-values.json', import.meta.url), 'utf8'),
) as Record<string, number[][]>;

const bits = new DataView(new ArrayBuffer(8));
/** Doubles in order as integers: neighbours differ by 1. */
function ordinal(value: number): bigint {
  bits.setFloat64(0, value);
  const raw = bits.getBigInt64(0);
  return raw < 0n ? -(raw & 0x7fffffffffffffffn) : raw;
}

function unitsApart(a: number, b: number): number {
  return Math.abs(Number(ordinal(a) - ordinal(b)));
}

type Elementary = (...values: number[]) => number;

describe('elementary functions', () => {
  for (const [name, rows] of Object.entries(reference)) {
    test(`${name} is within one unit in the last place of mpmath`, () => {
      const f = elementary[name as keyof typeof elementary] as Elementary;
      for (const row of rows) {
        const value = f(...row.slice(0, -1));
        expect(
          unitsApart(value, row.at(-1) ?? NaN),
          `${name}(${row.slice(0, -1).join(', ')}) = ${value}`,
        ).toBeLessThanOrEqual(1);
      }
    });
  }

  test('special cases are those of IEEE 754', () => {
    expect(elementary.exp(0)).toBe(1);
    expect(elementary.exp(-Infinity)).toBe(0);
    expect(elementary.exp(710)).toBe(Infinity);
    expect(elementary.ln(0)).toBe(-Infinity);
    expect(elementary.ln(-1)).toBeNaN();
    expect(elementary.ln(Infinity)).toBe(Infinity);
    expect(elementary.pow(0, 0)).toBe(1);
    expect(elementary.pow(-8, 1 / 3)).toBeNaN();
    expect(elementary.pow(-2, 3)).toBe(-8);
    expect(elementary.pow(0, -1)).toBe(Infinity);
    expect(elementary.pow(-0, -3)).toBe(-Infinity);
    expect(elementary.pow(0.5, Infinity)).toBe(0);
    expect(elementary.pow(1, Infinity)).toBeNaN();
    expect(elementary.pow(2, 1024)).toBe(Infinity);
    expect(elementary.pow(2, -1074)).toBe(5e-324);
    expect(elementary.sin(Infinity)).toBeNaN();
    expect(Object.is(elementary.sin(-0), -0)).toBe(true);
    expect(elementary.asin(1.1)).toBeNaN();
    expect(elementary.tanh(1e9)).toBe(1);
    expect(elementary.cosh(711)).toBe(Infinity);
    expect(elementary.atan(-Infinity)).toBe(-Math.PI / 2);
    for (const f of [
      elementary.exp,
      elementary.ln,
      elementary.sin,
      elementary.atan,
      elementary.tanh,
      elementary.acos,
    ]) {
      expect(f(NaN)).toBeNaN();
    }
  });

  test('exact cases are exact', () => {
    for (let e = -300; e <= 300; e += 1) expect(elementary.log10(Number(`1e${e}`))).toBe(e);
    for (let n = 0; n <= 33; n += 1) expect(elementary.pow(3, n)).toBe(Number(3n ** BigInt(n)));
    for (let n = 0; n <= 22; n += 1) expect(elementary.pow(10, n)).toBe(Number(`1e${n}`));
    expect(elementary.pow(9, 0.5)).toBe(3);
  });

  test('round goes to the even neighbour at halves', () => {
    expect([0.5, 1.5, 2.5, -0.5, -1.5, 2.4, 2.6].map(elementary.round)).toEqual([0, 2, 2, -0, -2, 2, 3]);
  });

  test('hill saturates without overflow', () => {
    expect(elementary.hill(1e200, 1, 4)).toBe(1);
    expect(elementary.hill(0, 2, 3)).toBe(0);
    expect(elementary.hill(2, 2, 3)).toBe(0.5);
  });
});
