import type { Person } from '@stillroom/shared/contracts';
import { type CloseCode, closeCodes } from '@stillroom/shared/protocol';
import * as Y from 'yjs';
import { type PresenceState, Presences } from './awareness.ts';
import { step1Frame, step2Frame, updateFrame } from './frames.ts';
import type { Occupant } from './occupant.ts';
import type { UpdateLog } from './persistence.ts';

/** What others do with a room: the planner listens here. */
export interface RoomObserver {
  /** The document changed; by a person of this process, or (null) elsewhere. */
  changed?(by: Person | null): void;
  /** Somebody came in and has been sent what the room itself has to send. */
  joined?(connection: Occupant): void;
  /** Somebody has left. */
  left?(): void;
  /** What these clients show of themselves changed, by connections of this process. */
  moved?(clients: readonly number[]): void;
  /** Whether it still has something to do here: the room stays open meanwhile. */
  readonly busy?: boolean;
  /** The room is about to go; the last moment to write down. It may yet stay. */
  closing?(): Promise<void>;
  /** The room is gone. */
  closed?(): void;
}

/** One open notebook: its document, and who is here. */
export class Room {
  readonly notebook: string;
  readonly doc = new Y.Doc();
  readonly #connections = new Set<Occupant>();
  readonly #presences: Presences<Occupant>;
  readonly #log: UpdateLog;
  readonly #broken: (room: Room) => void;
  readonly #observers: RoomObserver[] = [];
  /** Rows of the log that are not in the snapshot yet. */
  rows = 0;
  /** What the last application changed, as Yjs announces it while applying. */
  #announced: Uint8Array | null = null;

  /** `broken` is called when the log refused an update: the room then no longer tells what is kept. */
  constructor(notebook: string, log: UpdateLog, broken: (room: Room) => void) {
    this.notebook = notebook;
    this.#log = log;
    this.#broken = broken;
    this.#presences = new Presences(
      this.doc,
      (frame, from) => this.send(frame, from),
      (clients) => {
        for (const observer of this.#observers) observer.moved?.(clients);
      },
    );
    this.doc.on('update', (update: Uint8Array) => {
      this.#announced = update;
    });
  }

  /** Whether anybody is here. */
  get inhabited(): boolean {
    return this.#connections.size > 0;
  }

  /** Whether nobody is here and nothing goes on. */
  get idle(): boolean {
    return !this.inhabited && !this.#observers.some(({ busy }) => busy === true);
  }

  get connections(): Iterable<Occupant> {
    return this.#connections;
  }

  /** Everybody here, each once. */
  get people(): Person[] {
    return [...new Map([...this.#connections].map(({ person }) => [person.id, person])).values()];
  }

  observe(observer: RoomObserver): void {
    this.#observers.push(observer);
  }

  /**
   * Lets a connection in. Only somebody who may edit is asked for what the server lacks (step 1): a reader's answer
   * would hold old deletions and be refused.
   */
  join(connection: Occupant, edits: boolean): void {
    this.#connections.add(connection);
    if (edits) this.ask(connection);
    const presences = this.#presences.whole();
    if (presences !== null) connection.send(presences);
    for (const observer of this.#observers) observer.joined?.(connection);
  }

  leave(connection: Occupant): void {
    if (!this.#connections.delete(connection)) return;
    this.#presences.leave(connection);
    for (const observer of this.#observers) observer.left?.();
  }

  /** Asks a connection for everything this document lacks. */
  ask(connection: Occupant): void {
    connection.send(step1Frame(Y.encodeStateVector(this.doc)));
  }

  /** Everything that a state vector lacks, as the frame that answers it. */
  answer(stateVector: Uint8Array): Uint8Array {
    return step2Frame(Y.encodeStateAsUpdate(this.doc, stateVector));
  }

  /**
   * Applies an update, relays it at once and queues it for the log. Relaying before the commit is safe: everybody who
   * has it sends it again after a crash. Resolves when it is committed.
   * @throws where the bytes are no update.
   */
  write(update: Uint8Array, by: Occupant): Promise<void> {
    const news = this.#applyOrAbandon(update, by);
    // What waits for an update that has not come is not announced, and must be kept all the same.
    const waits = this.doc.store.pendingStructs !== null || this.doc.store.pendingDs !== null;
    if (news === null && !waits) return this.#log.committed();
    const bytes = waits || news === null ? update : news;
    this.send(updateFrame(bytes), by);
    this.rows += 1;
    const committed = this.#log.append(this.notebook, by.person.id, bytes);
    if (news !== null) for (const observer of this.#observers) observer.changed?.(by.person);
    return committed;
  }

  /** Resolves when everything written so far is committed. */
  settled(): Promise<void> {
    return this.#log.committed();
  }

  /** Gives the room up: what it holds and what is kept may differ. */
  abandon(): void {
    this.#broken(this);
  }

  /** Takes in updates that another process has kept already: relayed, not logged again. */
  takeIn(updates: readonly Uint8Array[]): void {
    let changed = false;
    for (const update of updates) {
      const news = this.#apply(update, 'elsewhere');
      if (news === null) continue;
      this.send(updateFrame(news), null);
      changed = true;
    }
    if (changed) for (const observer of this.#observers) observer.changed?.(null);
  }

  /** Takes a connection's awareness; false where it is none. */
  present(update: Uint8Array, by: Occupant): boolean {
    return this.#presences.take(update, by);
  }

  /** What these clients (all of this process by default) show of themselves. */
  presences(clients?: Iterable<number>): PresenceState[] {
    return this.#presences.states(clients);
  }

  /** Takes what another process tells of its clients. */
  presentElsewhere(states: readonly PresenceState[]): void {
    this.#presences.takeElsewhere(states);
  }

  /** Sends one frame to everybody but its sender: encoded once, the same buffer for all. */
  send(frame: Uint8Array, except: Occupant | null): void {
    for (const connection of this.#connections) if (connection !== except) connection.send(frame);
  }

  /** Ends every connection. */
  dismiss(code: CloseCode = closeCodes.later, why = 'The notebook is being put away; come back.'): void {
    for (const connection of [...this.#connections]) connection.end(code, why);
  }

  /** Tells the observers that the room is going. */
  async closing(): Promise<void> {
    await Promise.all(this.#observers.map((observer) => observer.closing?.()));
  }

  destroy(): void {
    for (const observer of this.#observers) observer.closed?.();
    this.#presences.destroy();
    this.doc.destroy();
  }

  /** Of an update whose end cannot be read, Yjs has taken in the beginning: the document is then not what is kept. */
  #applyOrAbandon(update: Uint8Array, by: Occupant): Uint8Array | null {
    try {
      return this.#apply(update, by);
    } catch (error) {
      // The sender hears first what was wrong.
      if (this.#announced !== null) queueMicrotask(() => this.abandon());
      throw error;
    }
  }

  #apply(update: Uint8Array, origin: unknown): Uint8Array | null {
    this.#announced = null;
    Y.applyUpdate(this.doc, update, origin);
    return this.#announced;
  }
}
