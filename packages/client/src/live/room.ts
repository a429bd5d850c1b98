import { cellsMap } from '@stillroom/shared/document';
import { messageTypes, type Notice, type PlanNotice } from '@stillroom/shared/protocol';
import * as decoding from 'lib0/decoding';
import { IndexeddbPersistence } from 'y-indexeddb';
import { Awareness } from 'y-protocols/awareness';
import { WebsocketProvider } from 'y-websocket';
import * as Y from 'yjs';
import { ChangeCount } from './changeCount.ts';
import { countingSocket } from './countingSocket.ts';

/** What a room tells the page. */
export interface RoomEvents {
  /** The socket opened or closed; `synced` once the whole document is here. */
  line(state: 'connecting' | 'open' | 'synced' | 'down'): void;
  /** Pending changes or their acknowledgement moved. */
  counted(count: ChangeCount): void;
  plan(notice: PlanNotice): void;
  notice(notice: Notice): void;
  /** The server ended the connection for good, with a close code of the protocol. */
  ended(code: number): void;
  /** The copy kept on this machine has been read. */
  restored(): void;
  /** A change by this person, with the cells it touched. */
  wrote(cells: readonly string[]): void;
}

/** Where y-indexeddb keeps the updates of a document. */
const updatesOfCopy = 'updates';

const unsentKey = (store: string) => `${store}.unsent`;

/** The cell ids that a transaction changed, or put in or took out. */
function touchedCells(transaction: Y.Transaction, cells: Y.Map<Y.Map<unknown>>): string[] {
  const touched = new Set<string>();
  for (const [type, keys] of transaction.changed) {
    if ((type as unknown) === cells) {
      for (const key of keys) if (key !== null) touched.add(key);
      continue;
    }
    let item: Y.Item | null = (type as Y.AbstractType<unknown>)._item;
    while (item !== null && (item.parent as unknown) !== cells) {
      item = (item.parent as Y.AbstractType<unknown> | null)?._item ?? null;
    }
    if (typeof item?.parentSub === 'string') touched.add(item.parentSub);
  }
  return [...touched];
}

/**
 * One notebook open on this page: the Yjs document, its copy on this machine, the line to the server and who is here.
 * `store` names the copy on this machine; `destroy` undoes everything, and with `forget` also drops that copy.
 */
export class LiveRoom {
  readonly doc = new Y.Doc();
  readonly awareness = new Awareness(this.doc);
  readonly count: ChangeCount;
  private readonly provider: WebsocketProvider;
  private readonly copy: IndexeddbPersistence;

  constructor(
    readonly notebook: string,
    private readonly store: string,
    private readonly events: RoomEvents,
  ) {
    this.count = new ChangeCount(Number(localStorage.getItem(unsentKey(store)) ?? 0));
    this.copy = new IndexeddbPersistence(store, this.doc);
    this.copy.on('synced', this.onRestored);
    // Before the provider is made: a change must be counted before its frame is sent.
    this.doc.on('afterTransaction', this.onTransaction);
    this.doc.on('update', this.onUpdate);
    const scheme = location.protocol === 'https:' ? 'wss' : 'ws';
    this.provider = new WebsocketProvider(`${scheme}://${location.host}/live`, notebook, this.doc, {
      awareness: this.awareness,
      connect: false,
      disableBc: true,
      maxBackoffTime: 10_000,
      WebSocketPolyfill: countingSocket(this.onFrame),
    });
    this.provider.messageHandlers[messageTypes.kept] = (_encoder, decoder) => {
      this.count.kept(decoding.readVarUint(decoder));
      this.counted();
    };
    this.provider.messageHandlers[messageTypes.plan] = (_encoder, decoder) =>
      events.plan(JSON.parse(decoding.readVarString(decoder)) as PlanNotice);
    this.provider.messageHandlers[messageTypes.notice] = (_encoder, decoder) =>
      events.notice(JSON.parse(decoding.readVarString(decoder)) as Notice);
    this.provider.on('status', this.onStatus);
    this.provider.on('sync', this.onSync);
    this.provider.on('closed', this.onClosed);
    addEventListener('pagehide', this.rememberUnsent);
  }

  /** Opens the line, or tries again at once. */
  connect(): void {
    this.provider.disconnect();
    this.provider.connect();
  }

  /** Closes the line until `connect`. */
  disconnect(): void {
    this.provider.disconnect();
  }

  /** Whether an origin stands for a change made on this page. */
  private isLocal(origin: unknown): boolean {
    return origin !== this.provider && origin !== this.copy;
  }

  private readonly onTransaction = (transaction: Y.Transaction): void => {
    if (!this.isLocal(transaction.origin) || transaction.changed.size === 0) return;
    this.events.wrote(touchedCells(transaction, cellsMap(this.doc)));
  };

  private readonly onUpdate = (_update: Uint8Array, origin: unknown): void => {
    if (!this.isLocal(origin)) return;
    this.count.changed();
    // While the line is down, a change is told as kept here once it is on this machine's disk.
    if (!this.provider.wsconnected) void this.stored().then(() => this.counted());
    // The provider's own listener sends the frame right after this one; tell of both together.
    else queueMicrotask(() => this.counted());
  };

  /** Resolves once all that was handed to the copy on this machine is stored: a transaction waits for earlier ones. */
  private stored(): Promise<void> {
    const { db } = this.copy;
    if (db === null) return this.copy.whenSynced.then(() => undefined);
    return new Promise((resolve) => {
      const look = db.transaction(updatesOfCopy, 'readonly');
      look.objectStore(updatesOfCopy).count();
      look.oncomplete = () => resolve();
      look.onabort = () => resolve();
    });
  }

  private readonly onFrame = (): void => this.count.sent();

  private readonly onStatus = ({ status }: { status: 'connected' | 'disconnected' | 'connecting' }): void => {
    if (status === 'disconnected') {
      this.count.closed();
      this.counted();
    }
    this.events.line(status === 'connected' ? 'open' : status === 'connecting' ? 'connecting' : 'down');
  };

  private readonly onSync = (synced: boolean): void => {
    if (synced) this.events.line('synced');
  };

  private readonly onClosed = ({ code }: { code: number }): void => this.events.ended(code);

  private readonly onRestored = (): void => this.events.restored();

  private counted(): void {
    if (!this.provider.wsconnected) this.rememberUnsent();
    else if (this.count.settled) localStorage.removeItem(unsentKey(this.store));
    this.events.counted(this.count);
  }

  private readonly rememberUnsent = (): void => {
    if (this.count.pending === 0) localStorage.removeItem(unsentKey(this.store));
    else localStorage.setItem(unsentKey(this.store), String(this.count.pending));
  };

  async destroy(forget = false): Promise<void> {
    removeEventListener('pagehide', this.rememberUnsent);
    this.rememberUnsent();
    this.provider.off('closed', this.onClosed);
    this.provider.off('sync', this.onSync);
    this.provider.off('status', this.onStatus);
    this.provider.destroy();
    this.doc.off('update', this.onUpdate);
    this.doc.off('afterTransaction', this.onTransaction);
    this.copy.off('synced', this.onRestored);
    if (forget) localStorage.removeItem(unsentKey(this.store));
    await (forget ? this.copy.clearData() : this.copy.destroy());
    this.awareness.destroy();
    this.doc.destroy();
  }
}
