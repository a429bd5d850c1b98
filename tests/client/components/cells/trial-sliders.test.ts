import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  sliderSteps,
  stepOf,
  tryables,
  valueAt,
} from '../../../../packages/client/src/components/cells/trialSliders.ts';

const network = {
  constants: [
    { name: 'ks', value: 0.16, unit: 'uM/s' },
    { name: 'off', value: 0, unit: '/s' },
    { name: 'open', value: null, unit: null },
    { name: 'p[1]', value: 2, unit: '/s' },
  ],
  start: { D: 60, E: 0 },
  reactions: [
    { label: '0 -> D', row: 0, from: {}, to: { D: 1 }, rate: 'ks', note: '' },
    { label: 'D -> 0', row: 1, from: { D: 1 }, to: {}, rate: 'p[1]*D', note: '' },
  ],
  units: { time: 's', amount: 'uM', volume: null },
};

describe('a slider', () => {
  test('has the cell’s own value at its middle, exactly, and a factor of ten to either side', () => {
    expect(valueAt(0.123456, 0)).toBe(0.123456);
    expect(valueAt(0.16, sliderSteps)).toBe(1.6);
    expect(valueAt(0.16, -sliderSteps)).toBe(0.016);
  });

  test('every step leads to a value that leads back to it', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e-6, max: 1e6, noNaN: true }),
        fc.integer({ min: -sliderSteps, max: sliderSteps }),
        (own, step) => stepOf(own, valueAt(own, step)) === step,
      ),
      { seed: 5 },
    );
  });

  test('a value beyond its ends stands at the end', () => {
    expect(stepOf(1, 5000)).toBe(sliderSteps);
    expect(stepOf(1, 0)).toBe(-sliderSteps);
  });
});

describe('what may be tried', () => {
  test('constants and starts above zero, with the note of their row', () => {
    expect(tryables(network, {}, ['constants', 'start'], ['supply', 'drain'])).toEqual([
      { kind: 'constants', name: 'ks', of: 'supply', own: 0.16, unit: 'uM/s' },
      { kind: 'constants', name: 'p[1]', of: 'drain', own: 2, unit: '/s' },
      { kind: 'start', name: 'D', of: 'start', own: 60, unit: 'uM' },
    ]);
  });

  test('a value of the cell’s settings is its own; a balance has no start', () => {
    const settings = { constants: { ks: 0.3, open: 4 } };
    const found = tryables(network, settings, ['constants'], []);
    expect(found.map(({ name, own }) => [name, own])).toEqual([
      ['ks', 0.3],
      ['open', 4],
      ['p[1]', 2],
    ]);
  });
});
