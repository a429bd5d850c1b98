import type { CellNotice, PlanNotice } from '@stillroom/shared/protocol';
import * as decoding from 'lib0/decoding';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import type { Room } from '../../../../packages/server/src/modules/collaboration/index.ts';
import { Announcer } from '../../../../packages/server/src/modules/compute/announcer.ts';

beforeEach(() => void vi.useFakeTimers());
afterEach(() => void vi.useRealTimers());

function build() {
  const told: PlanNotice[] = [];
  const room = {
    send(frame: Uint8Array) {
      const decoder = decoding.createDecoder(frame);
      decoding.readVarUint(decoder);
      told.push(JSON.parse(decoding.readVarString(decoder)) as PlanNotice);
    },
  } as unknown as Room;
  const announcer = new Announcer(room);
  return { announcer, told };
}

const current = (id: string, digest = 'd1') => say(id, { state: 'current', digest, shown: digest });
const say = (id: string, rest: Partial<CellNotice>) => ({
  notice: { id, state: 'current', digest: 'd1', shown: 'd1', draws: [], ...rest } as CellNotice,
  json: null,
});
const working = (id: string) => say(id, { state: 'working', digest: 'd2', shown: 'd1' });
const ids = ({ cells }: PlanNotice) => cells.map(({ id, state }) => `${id} ${state}`);

describe('what a room is told', () => {
  test('everything at first, then only what is different, then nothing', () => {
    const { announcer, told } = build();
    announcer.tellAll([current('a'), current('b')]);
    announcer.tell([current('a'), current('b', 'd9')]);
    announcer.tell([current('a'), current('b', 'd9')]);
    expect(told.map(({ whole }) => whole)).toEqual([true, false]);
    expect(told[1]?.cells.map(({ id }) => id)).toEqual(['b']);
  });

  test('that a result is on its way only where it does not come at once', () => {
    const { announcer, told } = build();
    announcer.tellAll([current('a')]);
    announcer.tell([working('a')]);
    announcer.tell([current('a', 'd2')]);
    vi.advanceTimersByTime(1000);
    expect(told.slice(1).map(ids)).toEqual([['a current']]);
    announcer.tell([working('a')]);
    vi.advanceTimersByTime(1000);
    expect(told.slice(2).map(ids)).toEqual([['a working']]);
  });

  test('one frame never contradicts the next: what is on its way goes along with what is told', () => {
    const { announcer, told } = build();
    announcer.tellAll([current('a'), current('b')]);
    announcer.tell([working('a'), working('b')]);
    announcer.tell([current('a', 'd2'), working('b')]);
    expect(told.slice(1).map(ids)).toEqual([['a current', 'b working']]);
  });

  test('failures, long runs and cells taken out at once', () => {
    const { announcer, told } = build();
    announcer.tellAll([current('a'), current('b'), current('c')]);
    announcer.tell([say('a', { state: 'failed', digest: null }), current('b'), current('c')]);
    announcer.tell([
      say('a', { state: 'failed', digest: null }),
      { ...working('b'), notice: { ...working('b').notice, since: 'now' } },
      current('c'),
    ]);
    announcer.tell([
      say('a', { state: 'failed', digest: null }),
      { ...working('b'), notice: { ...working('b').notice, since: 'now' } },
    ]);
    expect(told.slice(1).map((plan) => [...ids(plan), ...(plan.gone ?? [])])).toEqual([
      ['a failed'],
      ['b working'],
      ['c'],
    ]);
  });

  test('nothing after it was stopped', () => {
    const { announcer, told } = build();
    announcer.tellAll([current('a')]);
    announcer.tell([working('a')]);
    announcer.stop();
    vi.advanceTimersByTime(1000);
    expect(told).toHaveLength(1);
  });
});
