import type { Person } from '@stillroom/shared/contracts';
import * as decoding from 'lib0/decoding';
import * as encoding from 'lib0/encoding';
import {
  Awareness,
  applyAwarenessUpdate,
  encodeAwarenessUpdate,
  removeAwarenessStates,
} from 'y-protocols/awareness';
import type * as Y from 'yjs';
import { awarenessFrame } from './frames.ts';

/** A cursor and a name need far less. */
const stateLength = 8192;

/** A page shows itself once; a few more may stand for what it showed before it came back. */
const statesOfOne = 8;

interface Change {
  readonly added: readonly number[];
  readonly updated: readonly number[];
  readonly removed: readonly number[];
}

/**
 * Who is here and where they are. A connection speaks only for itself: a state names the person who is signed in or
 * nobody, and a client number belongs to the person who used it first. What else a message holds is passed over:
 * clients send on what they hear of others.
 */
export class Presences<Owner extends { readonly person: Person }> {
  readonly #awareness: Awareness;
  readonly #owners = new Map<number, Owner>();
  /** Whose the client numbers are that other processes told of, by id. */
  readonly #elsewhere = new Map<number, string>();

  /**
   * `tell` gets each change as a frame for everybody (clients skip what they know), with whom it came from. `moved` gets
   * the client numbers of what changed by connections of this process.
   */
  constructor(
    doc: Y.Doc,
    tell: (frame: Uint8Array, from: Owner | null) => void,
    moved: (clients: readonly number[]) => void = () => undefined,
  ) {
    this.#awareness = new Awareness(doc);
    this.#awareness.setLocalState(null);
    this.#awareness.on('update', ({ added, updated, removed }: Change, origin: unknown) => {
      const changed = [...added, ...updated, ...removed];
      const from = this.#ownerOf(origin);
      tell(awarenessFrame(encodeAwarenessUpdate(this.#awareness, changed)), from);
      for (const client of removed) this.#elsewhere.delete(client);
      // Every process notices by itself what has not been renewed for long.
      if (origin !== elsewhere && origin !== 'timeout') moved(changed);
    });
  }

  /** These clients (all of this process by default) as other processes are told of them; those that have left too. */
  states(clients: Iterable<number> = this.#owners.keys()): PresenceState[] {
    const { meta, states } = this.#awareness;
    return [...clients].flatMap((client) => {
      const known = meta.get(client);
      return known === undefined ? [] : [[client, known.clock, JSON.stringify(states.get(client) ?? null)]];
    });
  }

  /** Takes what another process tells of its clients; false where it is no presence. */
  takeElsewhere(told: readonly PresenceState[]): boolean {
    const update = writeEntries(told.map(([client, clock, text]) => ({ client, clock, text })));
    const entries = readEntries(update);
    if (entries === null) return false;
    for (const { client, clock, state } of entries) {
      if (clock <= (this.#awareness.meta.get(client)?.clock ?? 0) && this.#owners.has(client)) continue;
      // It has come back by a line to the other process: the old line here no longer speaks for it.
      this.#owners.delete(client);
      if (typeof state?.user?.id === 'string') this.#elsewhere.set(client, state.user.id);
    }
    applyAwarenessUpdate(this.#awareness, update, elsewhere);
    return true;
  }

  /** Everybody's state as a frame for somebody who joins; null where nobody is here. */
  whole(): Uint8Array | null {
    const clients = [...this.#awareness.getStates().keys()];
    return clients.length === 0 ? null : awarenessFrame(encodeAwarenessUpdate(this.#awareness, clients));
  }

  /** Takes a connection's own states; false where the message is no awareness at all. */
  take(update: Uint8Array, from: Owner): boolean {
    const entries = readEntries(update);
    if (entries === null) return false;
    const own = entries.filter((entry) => this.#isOwn(entry, from));
    if (own.length === 0) return true;
    const known = new Set([...this.#owners].filter(([, owner]) => owner === from).map(([client]) => client));
    const taken = own.filter(
      ({ client }) => known.has(client) || (known.size < statesOfOne && known.add(client)),
    );
    for (const { client } of taken) {
      this.#owners.set(client, from);
      this.#elsewhere.delete(client);
    }
    applyAwarenessUpdate(this.#awareness, writeEntries(taken), from);
    return true;
  }

  /** Takes away what a connection showed. */
  leave(owner: Owner): void {
    const clients = [...this.#owners].filter(([, other]) => other === owner).map(([client]) => client);
    for (const client of clients) this.#owners.delete(client);
    removeAwarenessStates(this.#awareness, clients, owner);
  }

  destroy(): void {
    this.#awareness.destroy();
  }

  #ownerOf(origin: unknown): Owner | null {
    for (const owner of this.#owners.values()) if (owner === origin) return owner;
    return null;
  }

  #isOwn({ client, clock, state }: Entry, from: Owner): boolean {
    const owner = this.#owners.get(client);
    if (owner === undefined && state === null) return false;
    const known = this.#elsewhere.get(client);
    if (known !== undefined && known !== from.person.id) return false;
    if (owner !== undefined && owner !== from) {
      // After a lost line the same client comes back while its old connection still stands; what its person's other
      // windows send on of it is not newer.
      const known = this.#awareness.meta.get(client)?.clock ?? 0;
      if (owner.person.id !== from.person.id || clock <= known) return false;
    }
    // A state without a person is what a client shows before it has said who it is.
    return state?.user === undefined || state.user.id === from.person.id;
  }
}

/** A client's number, the clock of its state, and the state as JSON. */
export type PresenceState = readonly [client: number, clock: number, state: string];

/** Where a change comes from that another process told of. */
const elsewhere = 'elsewhere';

interface RawEntry {
  readonly client: number;
  readonly clock: number;
  /** The state as JSON. */
  readonly text: string;
}

interface Entry extends RawEntry {
  readonly state: { readonly user?: { readonly id?: unknown } } | null;
}

/** The entries of an awareness update (y-protocols' layout); null where it is none. */
function readEntries(update: Uint8Array): Entry[] | null {
  try {
    const decoder = decoding.createDecoder(update);
    const count = decoding.readVarUint(decoder);
    const entries: Entry[] = [];
    for (let index = 0; index < count; index += 1) {
      const client = decoding.readVarUint(decoder);
      const clock = decoding.readVarUint(decoder);
      const text = decoding.readVarString(decoder);
      if (text.length > stateLength) return null;
      const state: unknown = JSON.parse(text);
      if (state !== null && typeof state !== 'object') return null;
      entries.push({ client, clock, text, state: state as Entry['state'] });
    }
    return decoding.hasContent(decoder) ? null : entries;
  } catch {
    return null;
  }
}

function writeEntries(entries: readonly RawEntry[]): Uint8Array {
  const encoder = encoding.createEncoder();
  encoding.writeVarUint(encoder, entries.length);
  for (const { client, clock, text } of entries) {
    encoding.writeVarUint(encoder, client);
    encoding.writeVarUint(encoder, clock);
    encoding.writeVarString(encoder, text);
  }
  return encoding.toUint8Array(encoder);
}
