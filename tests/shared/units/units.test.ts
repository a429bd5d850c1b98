import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { rational } from '@stillroom/shared/network';
import {
  avogadro,
  commonSymbols,
  conversionFactor,
  dimensionOf,
  parseUnit,
  printUnit,
  sameDimension,
  scaleOf,
  unitPower,
  unitProduct,
} from '@stillroom/shared/units';
import type { Unit } from '@stillroom/shared/units';

const seeded = { seed: 20261201, numRuns: 300 };
const factor = fc.record({
  symbol: fc.constantFrom(...commonSymbols),
  power: fc.integer({ min: -3, max: 3 }).filter((power) => power !== 0),
});
/** Units whose symbols differ, positive powers first. */
const unit: fc.Arbitrary<Unit> = fc
  .uniqueArray(factor, { maxLength: 4, minLength: 1, selector: ({ symbol }) => symbol })
  .map((factors) => [
    ...factors.filter(({ power }) => power > 0),
    ...factors.filter(({ power }) => power < 0),
  ]);

const read = (text: string): Unit => {
  const parsed = parseUnit(text);
  if (!parsed) throw new Error(`${text} was not read.`);
  return parsed;
};
const factorOf = (from: string, to: string) => {
  const exact = conversionFactor(read(from), read(to));
  return exact && rational.print(exact);
};

describe('units', () => {
  test.each([
    ['/uM/s', '/uM/s'],
    ['uM^-1 s^-1', '/uM/s'],
    ['1/h', '/h'],
    ['µM', 'uM'],
    ['μM', 'uM'],
    ['s^-1 mL', 'mL/s'],
    ['m^2/s', 'm^2/s'],
    ['mol/L', 'mol/L'],
    ['/M^2 /s', '/M^2/s'],
  ])('%s is printed as %s', (text, printed) => {
    expect(printUnit(read(text))).toBe(printed);
  });

  test.each([
    '',
    '/',
    '1',
    'foo',
    's^',
    's^0',
    's^1.5',
    'uM/',
    's^99',
    '2 s',
    'Mm^',
    'kmin',
    's s s s s s s s s s s s s',
  ])('%j is none', (text) => {
    expect(parseUnit(text)).toBeNull();
  });

  test('reading what is printed gives the same unit', () => {
    fc.assert(
      fc.property(unit, (given) => {
        expect(parseUnit(printUnit(given))).toEqual(given);
      }),
      seeded,
    );
  });

  test.each([
    ['h', 's', '3600'],
    ['d', 'min', '1440'],
    ['M', 'mol/L', '1'],
    ['uM', 'nM', '1000'],
    ['/uM/s', '/M/min', '60000000'],
    ['L', 'm^3', '1/1000'],
    ['um^3', 'fL', '1'],
    ['kg', 'mg', '1000000'],
    ['min', 'ms', '60000'],
  ])('%s in %s is exactly %s', (from, to, wanted) => {
    expect(factorOf(from, to)).toBe(wanted);
  });

  test('what differs in dimension is not converted', () => {
    expect(factorOf('uM', 's')).toBeNull();
    expect(factorOf('molecules', 'cells')).toBeNull();
    expect(factorOf('mol', 'molecules')).toBeNull();
  });

  test('scales and dimensions multiply', () => {
    fc.assert(
      fc.property(unit, unit, (a, b) => {
        const both = unitProduct(a, b);
        expect(rational.equal(scaleOf(both), rational.multiply(scaleOf(a), scaleOf(b)))).toBe(true);
        expect(dimensionOf(both)).toEqual(dimensionOf(a).map((power, i) => power + (dimensionOf(b)[i] ?? 0)));
        expect(sameDimension(dimensionOf(unitProduct(a, unitPower(a, -1))), dimensionOf([]))).toBe(true);
      }),
      seeded,
    );
  });

  test("Avogadro's number is the one that defines the mole (SI Brochure, 9th edition, 2019)", () => {
    expect(avogadro).toBe(602_214_076n * 10n ** 15n);
  });
});
