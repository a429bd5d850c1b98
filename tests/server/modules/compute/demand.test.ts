import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { Demand } from '../../../../packages/server/src/modules/compute/demand.ts';

const [ada, ben] = [{}, {}];
let ended: string[];
let demand: Demand;

beforeEach(() => {
  vi.useFakeTimers();
  ended = [];
  demand = new Demand((digest) => ended.push(digest));
});
afterEach(() => {
  demand.stop();
  vi.useRealTimers();
});

describe('a run', () => {
  test('is ended some time after the last who needed it let go', () => {
    demand.want('d', ada);
    demand.want('d', ben);
    demand.release('d', ada);
    vi.advanceTimersByTime(10_000);
    expect(ended).toEqual([]);
    demand.release('d', ben);
    expect(ended).toEqual([]);
    vi.advanceTimersByTime(10_000);
    expect(ended).toEqual(['d']);
  });

  test('goes on where somebody needs it again in time', () => {
    demand.want('d', ada);
    demand.release('d', ada);
    demand.want('d', ben);
    vi.advanceTimersByTime(10_000);
    expect(ended).toEqual([]);
  });

  test('that came to its end is not ended, and one that nobody wanted neither', () => {
    demand.want('d', ada);
    demand.settle('d', ada);
    demand.release('d', ada);
    demand.release('other', ada);
    vi.advanceTimersByTime(10_000);
    expect(ended).toEqual([]);
  });
});
