import { loadDocument } from '../notebooks/index.ts';
import { type UpdateLog, compact, type Transactions } from './persistence.ts';
import { Room } from './room.ts';

/** How long a room stays open with nobody in it: a reload comes back sooner. */
const lingering = 20_000;
/** Log rows after which the log is merged into the snapshot while people go on typing. */
const compactAt = 400;

export interface RoomStoreOptions {
  readonly database: Transactions;
  readonly log: UpdateLog;
  /** Called with each room once its document is there, before anybody is let in. */
  readonly opened?: (room: Room) => void;
  /** Gets what went wrong behind the scenes. */
  readonly failed: (words: string, error: unknown) => void;
  /** Ids of those who are at a notebook by lines to other processes. */
  readonly elsewhere?: (notebook: string) => readonly string[];
  readonly lingering?: number;
  readonly compactAt?: number;
}

interface Open {
  readonly room: Promise<Room>;
  /** Callers that are using the room without a connection. */
  users: number;
  timer: NodeJS.Timeout | null;
  compacting: Promise<void> | null;
}

/** The notebooks that are open in this process. */
export class RoomStore {
  readonly #options: RoomStoreOptions;
  readonly #open = new Map<string, Open>();
  #stopping = false;

  constructor(options: RoomStoreOptions) {
    this.#options = options;
  }

  /**
   * Uses a room, opening it where it is not: it stays at least until the work is done.
   * @throws what loading threw; the next caller tries again.
   */
  async use<T>(notebook: string, work: (room: Room) => T | Promise<T>): Promise<T> {
    const open = this.#take(notebook);
    open.users += 1;
    try {
      return await work(await open.room);
    } finally {
      open.users -= 1;
      this.#considerClosing(notebook, open);
    }
  }

  /** The room where it is open and loaded by now, without opening it. */
  async peek(notebook: string): Promise<Room | null> {
    return (await this.#open.get(notebook)?.room.catch(() => null)) ?? null;
  }

  /** Every room that is open and loaded. */
  async rooms(): Promise<Room[]> {
    const all = await Promise.all([...this.#open.keys()].map((notebook) => this.peek(notebook)));
    return all.filter((room) => room !== null);
  }

  /** Ids of those who are at these notebooks now, by lines to whichever process. */
  async peopleAt(notebooks: readonly string[]): Promise<Map<string, readonly string[]>> {
    const pairs = await Promise.all(
      notebooks.map(async (notebook) => {
        const here = (await this.peek(notebook))?.people ?? [];
        const all = [...here.map(({ id }) => id), ...(this.#options.elsewhere?.(notebook) ?? [])];
        return [notebook, [...new Set(all)]] as const;
      }),
    );
    return new Map(pairs);
  }

  /** To be called when a connection has left. */
  left(room: Room): void {
    const open = this.#open.get(room.notebook);
    if (open !== undefined) this.#considerClosing(room.notebook, open);
  }

  /** Lets go of a room whose memory and log may differ; everybody comes back to what is kept. */
  drop(room: Room): void {
    const open = this.#open.get(room.notebook);
    this.#open.delete(room.notebook);
    if (open?.timer) clearTimeout(open.timer);
    room.dismiss();
    room.destroy();
  }

  /** Ends every connection, waits for what was written, and closes every room. */
  async stop(): Promise<void> {
    this.#stopping = true;
    for (const [notebook, open] of [...this.#open]) {
      if (open.timer) clearTimeout(open.timer);
      const room = await open.room.catch(() => null);
      if (room === null) continue;
      room.dismiss();
      await this.#close(notebook, open, room);
    }
  }

  #take(notebook: string): Open {
    const known = this.#open.get(notebook);
    if (known !== undefined) return known;
    const open: Open = { room: this.#load(notebook), users: 0, timer: null, compacting: null };
    this.#open.set(notebook, open);
    open.room.catch(() => this.#open.delete(notebook));
    return open;
  }

  async #load(notebook: string): Promise<Room> {
    const { database, log, opened } = this.#options;
    const room = new Room(notebook, log, (broken) => this.drop(broken));
    room.rows = await loadDocument(database, notebook, room.doc);
    room.observe({ changed: () => this.#grown(room) });
    opened?.(room);
    return room;
  }

  #grown(room: Room): void {
    const open = this.#open.get(room.notebook);
    if (open !== undefined && room.rows >= (this.#options.compactAt ?? compactAt))
      void this.#compact(room, open);
  }

  /** Begins to wait for the room to be idle, unless that is under way. */
  #considerClosing(notebook: string, open: Open): void {
    if (this.#stopping || open.timer !== null || open.users > 0) return;
    open.timer = setTimeout(
      () =>
        void open.room.then(
          (room) => this.#close(notebook, open, room),
          () => undefined,
        ),
      this.#options.lingering ?? lingering,
    );
    open.timer.unref();
  }

  /** Puts a room away; where somebody came in or something goes on, it stays and is looked at again later. */
  async #close(notebook: string, open: Open, room: Room): Promise<void> {
    const unused = () => this.#stopping || (room.idle && open.users === 0);
    try {
      if (unused()) {
        await room.settled();
        await room.closing();
        if (room.rows > 0) await this.#compact(room, open);
      }
    } catch (error) {
      this.#options.failed('A notebook could not be put away cleanly; its log is whole.', error);
    }
    open.timer = null;
    if (this.#open.get(notebook) !== open) return;
    if (!unused()) return room.inhabited ? undefined : this.#considerClosing(notebook, open);
    this.#open.delete(notebook);
    room.destroy();
  }

  #compact(room: Room, open: Open): Promise<void> {
    if (open.compacting !== null) return open.compacting;
    room.rows = 0;
    open.compacting = compact(this.#options.database, room.notebook)
      .catch((error: unknown) => this.#options.failed('A log could not be compacted; it is whole.', error))
      .finally(() => {
        open.compacting = null;
      });
    return open.compacting;
  }
}
