import fc from 'fast-check';
import { expect, test } from 'vitest';
import { rational } from '@stillroom/kernel/exact';
import type { Polynomial } from '../../../../packages/kernel/src/theorems/polynomials/polynomial.ts';
import { multiply, polynomial } from '../../../../packages/kernel/src/theorems/polynomials/polynomial.ts';
import { zerosBetween } from '../../../../packages/kernel/src/theorems/polynomials/sturm.ts';

/** ∏ (x − root), times x² + 1 if asked for. */
function withRoots(roots: readonly number[], more: boolean): Polynomial {
  const linear = roots.map((root) => polynomial(rational(BigInt(-root)), rational(1n)));
  const quadratic = polynomial(rational(1n), rational(0n), rational(1n));
  return [...linear, ...(more ? [quadratic] : [])].reduce(multiply, polynomial(rational(3n)));
}

test('counts the different zeros strictly between the ends, whatever their multiplicity (Sturm 1829)', () => {
  fc.assert(
    fc.property(
      fc.array(fc.integer({ min: -6, max: 6 }), { maxLength: 6 }),
      fc.boolean(),
      fc.integer({ min: -7, max: 7 }),
      fc.integer({ min: 1, max: 9 }),
      (roots, more, low, width) => {
        const inside = new Set(roots.filter((root) => root > low && root < low + width)).size;
        expect(
          zerosBetween(withRoots(roots, more), rational(BigInt(low)), rational(BigInt(low + width))),
        ).toBe(inside);
        expect(zerosBetween(withRoots(roots, more), null, null)).toBe(new Set(roots).size);
      },
    ),
    { seed: 3, numRuns: 300 },
  );
});

test('the zero polynomial has no number of zeros', () => {
  expect(zerosBetween([], null, null)).toBeNull();
});
