import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { linearScale, niceDomain, ticks } from '../../../packages/client/src/chart/scale.ts';
import { spread, thinned } from '../../../packages/client/src/chart/series.ts';

describe('ticks', () => {
  test('read well', () => {
    expect(ticks(0, 340, 4)).toEqual([0, 100, 200, 300]);
    expect(ticks(0, 240, 5, true)).toEqual([0, 60, 120, 180, 240]);
    expect(ticks(0.1, 0.22, 4)).toEqual([0.1, 0.15, 0.2]);
  });

  test('stand within their domain, evenly, about as many as asked', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
        (from, span) => {
          const found = ticks(from, from + span, 5);
          expect(found.length).toBeGreaterThan(0);
          expect(found.length).toBeLessThanOrEqual(13);
          for (const tick of found) {
            expect(tick).toBeGreaterThanOrEqual(from - span * 1e-6);
            expect(tick).toBeLessThanOrEqual(from + span * (1 + 1e-6));
          }
        },
      ),
      { seed: 20261201 },
    );
  });

  test('a domain begins at zero where the values do not stray far from it', () => {
    expect(niceDomain(12, 310, 4)).toEqual([0, 400]);
    expect(niceDomain(-3, 5, 4)[0]).toBeLessThanOrEqual(-3);
  });

  test('a flat line still has a scale', () => {
    const domain = niceDomain(0, 0, 4);
    expect(Number.isFinite(linearScale(domain, [100, 0])(0))).toBe(true);
  });
});

describe('long series', () => {
  test('keep first, last and every peak when thinned', () => {
    const values = Array.from({ length: 10_000 }, (_, i) => (i === 4321 ? 9 : Math.sin(i / 500)));
    const kept = thinned(values, 500);
    expect(kept.length).toBeLessThanOrEqual(510);
    expect(kept[0]).toBe(0);
    expect(kept.at(-1)).toBe(9999);
    expect(kept).toContain(4321);
  });
});

describe('labels beside lines', () => {
  test('never come closer than asked and stay in order', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 200, noNaN: true }), { maxLength: 8 }), (wanted) => {
        const placed = spread(wanted, 15, 0, 200);
        const sorted = placed.toSorted((a, b) => a - b);
        for (let i = 1; i < sorted.length; i++)
          expect((sorted[i] ?? 0) - (sorted[i - 1] ?? 0)).toBeGreaterThanOrEqual(14.999);
      }),
      { seed: 20261201 },
    );
  });
});
