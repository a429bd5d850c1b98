import { describe, expect, test } from 'vitest';
import {
  longPlaces,
  type Placed,
  Places,
  slowPlaces,
} from '../../../../../packages/server/src/modules/compute/pool/places.ts';

const script = (owner: string): Placed => ({ kind: 'script', owner });
const quick = (owner: string): Placed => ({ kind: 'structure', owner });

describe('places', () => {
  test('the long kinds leave one prompt place to the quick ones', () => {
    const places = new Places(3);
    for (let place = 0; place < longPlaces(3); place += 1) {
      expect(places.mayBegin(script('a'))).toBe(true);
      places.begin(script('a'));
    }
    expect(places.mayBegin(script('b'))).toBe(false);
    expect(places.mayBegin(quick('b'))).toBe(true);
    places.begin(quick('b'));
    expect(places.mayBegin(quick('b'))).toBe(false);
  });

  test('a run that goes on aside frees its place', () => {
    const places = new Places(2);
    const long = script('a');
    places.begin(long);
    expect(places.mayBegin(script('a'))).toBe(false);
    places.slowDown(long);
    expect(places.slow).toBe(1);
    expect(places.mayBegin(script('a'))).toBe(true);
    places.end(long);
    expect(places.slow).toBe(0);
  });

  test('one owner leaves a slow place to the others', () => {
    const places = new Places(2);
    for (let place = 0; place < slowPlaces(2) - 1; place += 1) {
      expect(places.maySlowDown(script('a'))).toBe(true);
      places.slowDown(script('a'));
    }
    expect(places.maySlowDown(script('a'))).toBe(false);
    const other = script('b');
    expect(places.maySlowDown(other)).toBe(true);
    places.slowDown(other);
    expect(places.maySlowDown(script('c'))).toBe(false);
    places.end(other);
    expect(places.maySlowDown(script('c'))).toBe(true);
  });

  test('on the smallest pool, something long can still begin and go on', () => {
    const places = new Places(1);
    expect(places.mayBegin(script('a'))).toBe(true);
    expect(places.maySlowDown(script('a'))).toBe(true);
  });
});
