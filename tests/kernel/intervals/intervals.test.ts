import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  add as addRational,
  compare,
  fromDouble,
  multiply as multiplyRational,
  parseRational,
  rational,
  subtract as subtractRational,
} from '@stillroom/kernel/exact';
import type { Interval, IntervalSystem } from '@stillroom/kernel/intervals';
import {
  add,
  disjoint,
  enclose,
  multiply,
  point,
  power,
  subtract,
  verifiedBox,
} from '@stillroom/kernel/intervals';

const number = fc.double({ min: -1e100, max: 1e100, noNaN: true, noDefaultInfinity: true });

/** Whether an exact number lies in an interval. */
function holds({ low, high }: Interval, exact: ReturnType<typeof rational>): boolean {
  return compare(fromDouble(low), exact) <= 0 && compare(exact, fromDouble(high)) <= 0;
}

describe('interval arithmetic', () => {
  test('every operation encloses the exact result', () => {
    fc.assert(
      fc.property(number, number, (a, b) => {
        const [x, y] = [fromDouble(a), fromDouble(b)];
        expect(holds(add(point(a), point(b)), addRational(x, y))).toBe(true);
        expect(holds(subtract(point(a), point(b)), subtractRational(x, y))).toBe(true);
        expect(holds(multiply(point(a), point(b)), multiplyRational(x, y))).toBe(true);
      }),
      { seed: 1, numRuns: 500 },
    );
  });

  test('products down to the smallest doubles are enclosed', () => {
    const tiny = 5e-324;
    expect(
      holds(multiply(point(tiny), point(0.4)), multiplyRational(fromDouble(tiny), fromDouble(0.4))),
    ).toBe(true);
  });

  test('a rational is enclosed tightly', () => {
    const third = rational(1n, 3n);
    const { low, high } = enclose(third);
    expect(holds({ low, high }, third)).toBe(true);
    expect(high - low).toBeLessThan(1e-15);
  });

  test('powers and disjointness', () => {
    expect(
      holds(
        power(point(1.1), 5),
        multiplyRational(
          fromDouble(1.1),
          multiplyRational(
            fromDouble(1.1),
            multiplyRational(fromDouble(1.1), multiplyRational(fromDouble(1.1), fromDouble(1.1))),
          ),
        ),
      ),
    ).toBe(true);
    expect(disjoint({ low: 1, high: 2 }, { low: 2, high: 3 })).toBe(false);
    expect(disjoint({ low: 1, high: 2 }, { low: 2.5, high: 3 })).toBe(true);
  });
});

/** x² = a with derivative 2 x. */
const squareRoot = (a: string): IntervalSystem => ({
  size: 1,
  values: ([x]) => [subtract(multiply(x!, x!), enclose(parseRational(a)!))],
  jacobian: ([x]) => [[add(x!, x!)]],
});

describe('verified boxes (Krawczyk 1969)', () => {
  test('√2 is enclosed by a box with exactly one zero', () => {
    const [side] = verifiedBox(squareRoot('2'), [1.41421356])!;
    expect(compare(multiplyRational(fromDouble(side!.low), fromDouble(side!.low)), rational(2n))).toBe(-1);
    expect(compare(multiplyRational(fromDouble(side!.high), fromDouble(side!.high)), rational(2n))).toBe(1);
  });

  test('nothing is proven where there is no zero, far away from one, or at a double zero', () => {
    expect(verifiedBox(squareRoot('-1'), [1])).toBeNull();
    expect(verifiedBox(squareRoot('2'), [1.5])).toBeNull();
    // (x − 1)² = 0.
    const double: IntervalSystem = {
      size: 1,
      values: ([x]) => [multiply(subtract(x!, point(1)), subtract(x!, point(1)))],
      jacobian: ([x]) => [[add(subtract(x!, point(1)), subtract(x!, point(1)))]],
    };
    expect(verifiedBox(double, [1])).toBeNull();
    expect(verifiedBox(double, [1.0000001])).toBeNull();
  });

  test('states that are not positive are refused', () => {
    expect(verifiedBox(squareRoot('2'), [-1.41421356])).toBeNull();
  });
});
