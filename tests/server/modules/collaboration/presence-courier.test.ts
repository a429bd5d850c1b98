import type { Person } from '@stillroom/shared/contracts';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import * as Y from 'yjs';
import {
  type PresenceState,
  Presences,
} from '../../../../packages/server/src/modules/collaboration/awareness.ts';
import { PeopleElsewhere } from '../../../../packages/server/src/modules/collaboration/people-elsewhere.ts';
import {
  batches,
  PresenceCourier,
  type Tell,
} from '../../../../packages/server/src/modules/collaboration/presence-courier.ts';
import type { Room } from '../../../../packages/server/src/modules/collaboration/room.ts';
import { eventBytes } from '../../../../packages/server/src/events.ts';

const person = (id: string): Person => ({ id, name: id, initials: id.slice(0, 1), hue: 0 });
const state = (client: number, clock: number, words: object | null): PresenceState => [
  client,
  clock,
  JSON.stringify(words),
];

describe('states on their way to other processes', () => {
  test('fit into events, all of them, in order', () => {
    const states = Array.from({ length: 200 }, (_, n) =>
      state(n, 1, { user: { id: 'a' }, cursor: 'é"'.repeat(n) }),
    );
    const lots = batches(states);
    expect(lots.flat()).toEqual(states);
    expect(lots.length).toBeGreaterThan(1);
    for (const lot of lots) {
      const payload = { from: 'f'.repeat(36), notebook: 'n'.repeat(36), states: lot };
      expect(Buffer.byteLength(JSON.stringify({ name: 'presence.moved', payload }))).toBeLessThan(eventBytes);
    }
  });

  test('go without their cursor where that is too long, and not at all where all is', () => {
    const long = state(1, 1, { user: { id: 'a' }, cell: 'c', cursor: 'x'.repeat(8000) });
    expect(batches([long])).toEqual([[state(1, 1, { user: { id: 'a' }, cell: 'c' })]]);
    expect(batches([state(2, 1, { user: { id: 'y'.repeat(8000) } })])).toEqual([]);
  });
});

describe('a courier', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());

  function build() {
    const told: [string, unknown][] = [];
    const elsewhere = new PeopleElsewhere();
    const people = [person('ada')];
    const room = {
      notebook: 'n',
      get people() {
        return people;
      },
      get inhabited() {
        return people.length > 0;
      },
      presences: (clients: Iterable<number> = [1]) => [...clients].map((one) => state(one, 1, { cell: 'c' })),
    } as unknown as Room;
    const tell: Tell = (name, payload) => void told.push([name, payload]);
    const courier = new PresenceCourier({ room, origin: 'here', elsewhere, tell });
    const moves = () => told.filter(([name]) => name === 'presence.moved').length;
    return { courier, told, elsewhere, people, moves };
  }

  test('tells of cursors only while somebody is there by another process, and not faster than a hand', () => {
    const { courier, elsewhere, moves } = build();
    courier.joined();
    courier.moved([1]);
    vi.advanceTimersByTime(1000);
    expect(moves()).toBe(0);
    elsewhere.hear('there', 'n', ['ben']);
    for (let step = 0; step < 50; step += 1) {
      courier.moved([1]);
      vi.advanceTimersByTime(10);
    }
    vi.advanceTimersByTime(1000);
    expect(moves()).toBeGreaterThan(1);
    expect(moves()).toBeLessThan(9);
    courier.closed();
  });

  test('tells again who is here while somebody is, and that nobody is', () => {
    const { courier, told, people } = build();
    courier.joined();
    vi.advanceTimersByTime(45_000);
    expect(told.filter(([name]) => name === 'people.here')).toHaveLength(3);
    people.length = 0;
    courier.left();
    expect(told.at(-1)).toEqual(['people.here', { from: 'here', notebook: 'n', people: [] }]);
    vi.advanceTimersByTime(100_000);
    expect(told).toHaveLength(4);
  });
});

describe('people elsewhere', () => {
  test('are those whom a process told of last, until it is silent for long', () => {
    let now = 0;
    const elsewhere = new PeopleElsewhere(() => now);
    expect(elsewhere.hear('p', 'n', ['ada', 'ben'])).toBe(true);
    expect(elsewhere.hear('q', 'n', ['ada'])).toBe(true);
    expect(elsewhere.hear('p', 'n', ['ben'])).toBe(false);
    expect(elsewhere.at('n').sort()).toEqual(['ada', 'ben']);
    elsewhere.hear('q', 'n', []);
    expect(elsewhere.at('n')).toEqual(['ben']);
    now = 61_000;
    expect(elsewhere.at('n')).toEqual([]);
    expect(elsewhere.hear('p', 'n', ['ben'])).toBe(true);
  });
});

describe('presences of another process', () => {
  const build = () => {
    const moved: number[] = [];
    const presences = new Presences<{ person: Person }>(
      new Y.Doc(),
      () => undefined,
      (clients) => void moved.push(...clients),
    );
    return { presences, moved };
  };
  const update = (states: readonly PresenceState[]) => {
    // The layout of a presence message is that of what is told: taken by a second room, sent on as a frame.
    let frame = new Uint8Array();
    const other = new Presences<{ person: Person }>(new Y.Doc(), (bytes) => void (frame = bytes.slice()));
    other.takeElsewhere(states);
    return frame.slice(1 + lengthBytes(frame.slice(1)));
  };
  const lengthBytes = (bytes: Uint8Array) => bytes.findIndex((byte) => byte < 128) + 1;

  test('are not sent back, and nobody here speaks for them', () => {
    const { presences, moved } = build();
    presences.takeElsewhere([state(7, 3, { user: { id: 'ben' } })]);
    expect(moved).toEqual([]);
    const ada = { person: person('ada') };
    presences.take(update([state(7, 9, { user: { id: 'ada' } })]), ada);
    expect(presences.states([7])).toEqual([state(7, 3, { user: { id: 'ben' } })]);
    // Ben himself comes back by a line to this process.
    const ben = { person: person('ben') };
    presences.take(update([state(7, 4, { user: { id: 'ben' }, cell: 'c' })]), ben);
    expect(moved).toEqual([7]);
    expect(presences.states()).toEqual([state(7, 4, { user: { id: 'ben' }, cell: 'c' })]);
  });

  test('an old line here takes away nothing of one who came back by another process', () => {
    const { presences, moved } = build();
    const ben = { person: person('ben') };
    presences.take(update([state(7, 1, { user: { id: 'ben' } })]), ben);
    presences.takeElsewhere([state(7, 2, { user: { id: 'ben' }, cell: 'c' })]);
    moved.length = 0;
    presences.leave(ben);
    expect(moved).toEqual([]);
    expect(presences.states([7])).toEqual([state(7, 2, { user: { id: 'ben' }, cell: 'c' })]);
  });
});
