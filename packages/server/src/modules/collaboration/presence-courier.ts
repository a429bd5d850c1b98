import type { DomainEvents } from '../../events.ts';
import { eventBytes } from '../../events.ts';
import type { PresenceState } from './awareness.ts';
import type { PeopleElsewhere } from './people-elsewhere.ts';
import type { Room, RoomObserver } from './room.ts';

/** Milliseconds between two tellings of cursors: they follow a hand, and each costs every process. */
const pace = 100;
/** Milliseconds after which everybody who is here is told of again. */
const repeating = 20_000;
/** People told of at most: more are not shown by name anyway. */
const mostPeople = 150;
/** Bytes of an event that are left to states, and of one state. */
const roomForStates = eventBytes - 400;

/** How a process tells others; they hear it once it is sent. */
export type Tell = <Name extends 'people.here' | 'presence.moved'>(
  name: Name,
  payload: DomainEvents[Name],
) => void;

export interface CourierOptions {
  readonly room: Room;
  /** Names this process. */
  readonly origin: string;
  readonly elsewhere: PeopleElsewhere;
  readonly tell: Tell;
}

/**
 * Tells other processes who is in a room of this one and, while somebody is there by another process, where their cursors
 * are. What one event cannot hold goes in several; a state too large for any goes without its cursor.
 */
export class PresenceCourier implements RoomObserver {
  readonly #options: CourierOptions;
  readonly #moved = new Set<number>();
  #pause: NodeJS.Timeout | null = null;
  #repeat: NodeJS.Timeout | null = null;

  constructor(options: CourierOptions) {
    this.#options = options;
  }

  joined(): void {
    this.#tellPeople();
    this.#repeat ??= setInterval(() => this.#tellPeople(), repeating).unref();
  }

  left(): void {
    this.#tellPeople();
    if (this.#options.room.inhabited) return;
    this.#stopRepeating();
  }

  moved(clients: readonly number[]): void {
    for (const client of clients) this.#moved.add(client);
    if (this.#pause !== null) return;
    this.#tellMoved();
    this.#pause = setTimeout(() => {
      this.#pause = null;
      if (this.#moved.size > 0) this.moved([]);
    }, pace).unref();
  }

  /** Another process has somebody here whom it did not have before: it has yet to hear who is here. */
  introduce(): void {
    if (!this.#options.room.inhabited) return;
    this.#tellPeople();
    this.#tellStates(this.#options.room.presences());
  }

  closed(): void {
    this.#stopRepeating();
    if (this.#pause !== null) clearTimeout(this.#pause);
  }

  #tellPeople(): void {
    const { room, origin, tell } = this.#options;
    const people = room.people.slice(0, mostPeople).map(({ id }) => id);
    tell('people.here', { from: origin, notebook: room.notebook, people });
  }

  #tellMoved(): void {
    const { room, elsewhere } = this.#options;
    const clients = [...this.#moved];
    this.#moved.clear();
    if (elsewhere.at(room.notebook).length > 0) this.#tellStates(room.presences(clients));
  }

  #tellStates(states: readonly PresenceState[]): void {
    const { room, origin, tell } = this.#options;
    for (const batch of batches(states))
      tell('presence.moved', { from: origin, notebook: room.notebook, states: batch });
  }

  #stopRepeating(): void {
    if (this.#repeat !== null) clearInterval(this.#repeat);
    this.#repeat = null;
  }
}

/** States in as many lots as fit into events, each of which holds at least one. */
export function batches(states: readonly PresenceState[]): PresenceState[][] {
  const lots: PresenceState[][] = [];
  let room = 0;
  for (const whole of states) {
    const state = sizeOf(whole) <= roomForStates ? whole : withoutCursor(whole);
    const size = sizeOf(state);
    if (size > roomForStates) continue;
    if (size > room) {
      lots.push([]);
      room = roomForStates;
    }
    lots.at(-1)?.push(state);
    room -= size;
  }
  return lots;
}

const sizeOf = (state: PresenceState): number => Buffer.byteLength(JSON.stringify(state)) + 1;

function withoutCursor([client, clock, text]: PresenceState): PresenceState {
  const { user, cell } = JSON.parse(text) as { readonly user?: unknown; readonly cell?: unknown };
  return [client, clock, JSON.stringify({ user, cell })];
}
