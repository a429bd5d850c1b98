import type { IncomingMessage } from 'node:http';
import type { Duplex } from 'node:stream';
import type { Person } from '@stillroom/shared/contracts';
import { type CloseCode, closeCodes, limits } from '@stillroom/shared/protocol';
import { may } from '@stillroom/shared/roles';
import { type WebSocket, WebSocketServer } from 'ws';
import type { Access } from './access.ts';
import { Connection } from './connection.ts';
import type { RoomStore } from './room-store.ts';

/** Who stands before the door, and with which session. */
export interface Visitor {
  readonly person: Person;
  readonly session: string;
}

export interface GatewayOptions {
  readonly rooms: RoomStore;
  readonly access: Access;
  /** The person signed in by the session of this request; null where nobody is. */
  readonly identify: (request: IncomingMessage) => Promise<Visitor | null>;
  /** Whether the session by which somebody came still stands. */
  readonly stands: (visitor: Visitor) => Promise<boolean>;
  readonly isSameOrigin: (request: IncomingMessage) => boolean;
  readonly failed: (words: string, error: unknown) => void;
}

/** A visitor who may come in. */
interface Admitted {
  readonly visitor: Visitor;
  readonly notebook: string;
}

const address = /^\/live\/([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})$/u;

/**
 * How often a line is asked whether it is still there, in milliseconds; no answer until the next time ends it. The live
 * client takes half a minute of silence for a lost line, and hears no pings: it is told its count again.
 */
const heartbeat = 12_000;
/**
 * What the socket itself takes at most. Above what the protocol allows: a frame between the two is refused with the
 * protocol's own reason, where the socket's would have the client send it again and again.
 */
const socketFrame = 4 * limits.frame;
/** What may be sent before the visitor has been let in, in bytes. */
const earlyBytes = 2 * limits.frame;
/** A line that has this much unsent, in bytes, is too slow to follow and comes back for the whole. */
const backlog = 16 * 1024 * 1024;
const crowdedWords = `You have ${limits.linesOfOne} pages of notebooks open; close some and come back.`;

/**
 * The door of live editing. Every upgrade is accepted and only then judged: a browser learns the reason from a close
 * code, but nothing from a refused upgrade.
 */
export class Gateway {
  readonly #options: GatewayOptions;
  readonly #server = new WebSocketServer({
    noServer: true,
    perMessageDeflate: false,
    maxPayload: socketFrame,
  });
  readonly #sessions = new Map<Connection, string>();
  readonly #alive = new WeakSet<WebSocket>();
  /** Lines of which it is not known yet whose they are, or whose notebook is being opened. */
  #before = 0;
  readonly #heart: NodeJS.Timeout;

  constructor(options: GatewayOptions) {
    this.#options = options;
    this.#heart = setInterval(() => this.#beat(), heartbeat);
    this.#heart.unref();
  }

  /** Takes an upgrade to /live/…; false leaves any other to somebody else. */
  upgrade(request: IncomingMessage, socket: Duplex, head: Buffer): boolean {
    const { pathname } = new URL(request.url ?? '/', 'http://localhost');
    if (!pathname.startsWith('/live/')) return false;
    this.#server.handleUpgrade(request, socket, head, (line) => {
      if ('setNoDelay' in socket && typeof socket.setNoDelay === 'function') socket.setNoDelay(true);
      this.#welcome(line, request, address.exec(pathname)?.[1] ?? null);
    });
    return true;
  }

  /** Ends the lines of a session, or all of a person but those of one session. */
  endSessions(person: string, session: string | null, except: string | null): void {
    for (const [connection, own] of this.#sessions) {
      if (connection.person.id !== person || own === except) continue;
      if (session === null || session === own)
        connection.end(closeCodes.signedOut, 'Your session has ended; sign in again.');
    }
  }

  /** The lines of a person, or of everybody. */
  connections(person?: string): Connection[] {
    const all = [...this.#sessions.keys()];
    return person === undefined ? all : all.filter((connection) => connection.person.id === person);
  }

  stop(): void {
    clearInterval(this.#heart);
    for (const line of this.#server.clients)
      line.close(closeCodes.later, 'The server is stopping; come back.');
    this.#server.close();
  }

  /** Listens at once, so that nothing sent while the visitor is being judged is lost. */
  #welcome(line: WebSocket, request: IncomingMessage, notebook: string | null): void {
    const early: Uint8Array[] = [];
    let waiting = 0;
    let connection: Connection | null = null;
    this.#alive.add(line);
    line.on('pong', () => this.#alive.add(line));
    line.on('error', () => line.terminate());
    line.on('message', (data: Buffer) => {
      if (connection !== null) return connection.receive(data);
      // What still comes in while a line is closing is not kept.
      if (line.readyState !== line.OPEN) return;
      waiting += data.length;
      if (early.push(data) <= 100 && waiting <= earlyBytes) return;
      early.length = 0;
      line.close(closeCodes.tooMuch, 'Too much was sent before the answer.');
    });
    const refuse = (code: CloseCode, why: string) => line.close(code, why);
    if (this.#before >= limits.linesBefore)
      return refuse(closeCodes.later, 'More come at once than can be let in; come back in a moment.');
    this.#before += 1;
    this.#judge(request, notebook, refuse)
      .then((admitted) => {
        if (admitted === null || line.readyState !== line.OPEN) return;
        return this.#let(line, admitted, (admittedLine) => {
          connection = admittedLine;
          for (const frame of early.splice(0)) connection.receive(frame);
        });
      })
      .catch((error: unknown) => {
        this.#options.failed('A live line could not be opened.', error);
        refuse(closeCodes.later, 'The notebook cannot be opened just now; come back.');
      })
      .finally(() => {
        this.#before -= 1;
      });
  }

  /** Decides who may come in; null where the line was refused with its reason. */
  async #judge(
    request: IncomingMessage,
    notebook: string | null,
    refuse: (code: CloseCode, why: string) => void,
  ): Promise<Admitted | null> {
    const { access, identify, isSameOrigin } = this.#options;
    const refused = (code: CloseCode, why: string) => {
      refuse(code, why);
      return null;
    };
    if (notebook === null) return refused(closeCodes.gone, 'There is no such notebook.');
    if (!isSameOrigin(request))
      return refused(closeCodes.refused, 'This line was not opened by a page of this installation.');
    const visitor = await identify(request);
    if (visitor === null) return refused(closeCodes.signedOut, 'You are not signed in.');
    const role = await access.roleAt(visitor.person.id, notebook);
    if (role === 'gone') return refused(closeCodes.gone, 'There is no such notebook (any more).');
    if (!may(role, 'notebook.read')) return refused(closeCodes.refused, 'You may not read this notebook.');
    return { visitor, notebook };
  }

  /**
   * Opens the room and lets the connection in. It is on the list before session and role are looked at once more: what
   * ended while the visitor was being judged is seen then, what ends later is told to the list. `admitted` gets it before
   * it joins.
   */
  #let(
    line: WebSocket,
    { visitor, notebook }: Admitted,
    admitted: (connection: Connection) => void,
  ): Promise<void> {
    const { rooms, access, stands } = this.#options;
    return rooms.use(notebook, async (room) => {
      if (this.connections(visitor.person.id).length >= limits.linesOfOne)
        return line.close(closeCodes.crowded, crowdedWords);
      const connection = new Connection(visitor.person, room, outlet(line), access);
      this.#sessions.set(connection, visitor.session);
      const left = () => {
        connection.left();
        this.#sessions.delete(connection);
        rooms.left(room);
      };
      line.on('close', left);
      const [standing, role] = await Promise.all([
        stands(visitor),
        access.roleAt(visitor.person.id, notebook),
      ]);
      if (!standing) connection.end(closeCodes.signedOut, 'Your session has ended; sign in again.');
      else if (!may(role === 'gone' ? null : role, 'notebook.read'))
        connection.end(closeCodes.refused, 'You may not read this notebook.');
      if (line.readyState !== line.OPEN) return left();
      connection.join(role !== 'gone' && may(role, 'notebook.edit'));
      admitted(connection);
    });
  }

  #beat(): void {
    for (const connection of this.#sessions.keys()) connection.tellKept();
    for (const line of this.#server.clients) {
      if (!this.#alive.has(line)) {
        line.terminate();
        continue;
      }
      this.#alive.delete(line);
      line.ping();
    }
  }
}

/** A socket as a connection uses it: one that cannot keep up is ended rather than filling the memory. */
function outlet(line: WebSocket): { send(bytes: Uint8Array): void; close(code: number, why: string): void } {
  return {
    send(bytes) {
      if (line.bufferedAmount > backlog) line.close(closeCodes.later, 'The line is too slow; come back.');
      else line.send(bytes);
    },
    close: (code, why) => line.close(code, why),
  };
}
