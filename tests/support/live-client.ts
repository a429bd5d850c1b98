import { messageTypes, type CellNotice, type Notice, type PlanNotice } from '@stillroom/shared/protocol';
import * as decoding from 'lib0/decoding';
import { WebSocket } from 'ws';
import { WebsocketProvider } from 'y-websocket';
import * as Y from 'yjs';

/** Where a client connects to and as whom. */
export interface LiveAddress {
  /** "ws://127.0.0.1:PORT/live" */
  readonly url: string;
  readonly notebook: string;
  readonly headers: Readonly<Record<string, string>>;
}

/** Seconds after which waiting is given up: far more than anything here takes on a busy machine. */
const patience = 45;

type Decoder = decoding.Decoder;
interface Provider extends WebsocketProvider {
  messageHandlers: ((encoder: unknown, decoder: Decoder, ...rest: unknown[]) => void)[];
}

/** A person at a notebook: a real Yjs document over a real socket, as the page uses them. */
export class LiveClient {
  readonly doc: Y.Doc;
  readonly provider: Provider;
  /** Cells as last announced, by id. */
  readonly plan = new Map<string, CellNotice>();
  readonly notices: Notice[] = [];
  /** Why the server ended the line for good, once it has. */
  closed: { code: number; reason: string } | null = null;
  /** Document frames sent on the present line, and how many of them are committed. */
  sent = 0;
  kept = 0;
  #heard = new Set<() => void>();

  constructor({ url, notebook, headers }: LiveAddress, doc = new Y.Doc()) {
    this.doc = doc;
    const began = () => {
      this.sent = 0;
      this.kept = 0;
    };
    const counted = () => {
      this.sent += 1;
    };
    class CountingSocket extends WebSocket {
      constructor(address: string) {
        super(address, { headers, perMessageDeflate: false });
        began();
      }
      override send(data: Parameters<WebSocket['send']>[0]): void {
        const bytes = data as Uint8Array;
        if (bytes[0] === messageTypes.sync && (bytes[1] === 1 || bytes[1] === 2)) counted();
        super.send(data);
      }
    }
    this.provider = new WebsocketProvider(url, notebook, doc, {
      WebSocketPolyfill: CountingSocket as unknown as typeof globalThis.WebSocket,
      disableBc: true,
      maxBackoffTime: 200,
    }) as Provider;
    this.#handle(messageTypes.kept, (decoder) => {
      this.kept = decoding.readVarUint(decoder);
    });
    this.#handle(messageTypes.plan, (decoder) =>
      this.#take(JSON.parse(decoding.readVarString(decoder)) as PlanNotice),
    );
    this.#handle(messageTypes.notice, (decoder) => {
      this.notices.push(JSON.parse(decoding.readVarString(decoder)) as Notice);
    });
    this.provider.on('connection-close', (event) => {
      if (event !== null && event.code >= 4400 && event.code < 4500)
        this.closed = { code: event.code, reason: event.reason };
      this.#tell();
    });
    this.provider.on('sync', () => this.#tell());
    doc.on('update', () => this.#tell());
    this.provider.awareness.on('change', () => this.#tell());
  }

  /** Resolves once the condition holds, asked again after everything heard. */
  async until(holds: () => boolean, what: string, seconds = patience): Promise<void> {
    if (holds()) return;
    await new Promise<void>((resolve, reject) => {
      const check = () => {
        if (!holds()) return;
        done();
        resolve();
      };
      const timer = setTimeout(() => {
        done();
        reject(new Error(`Waited ${seconds} s in vain: ${what}; the line is ${this.#lineInWords()}.`));
      }, seconds * 1000);
      const done = () => {
        clearTimeout(timer);
        this.#heard.delete(check);
      };
      this.#heard.add(check);
    });
  }

  /** Resolves when the server's document has arrived. */
  synced(): Promise<void> {
    return this.until(() => this.provider.synced, 'the document did not come');
  }

  /** Resolves when everything written so far is acknowledged as committed. */
  allKept(): Promise<void> {
    return this.until(
      () => this.provider.synced && this.kept >= this.sent,
      `${this.sent - this.kept} of ${this.sent} edits were not acknowledged`,
    );
  }

  /** Resolves with a cell's notice once it is as wished. */
  async cell(id: string, wished: (cell: CellNotice) => boolean, what: string): Promise<CellNotice> {
    const fits = () => {
      const cell = this.plan.get(id);
      return cell !== undefined && wished(cell);
    };
    await this.until(fits, `${what}; cell ${id} is ${JSON.stringify(this.plan.get(id))}`);
    return this.plan.get(id) as CellNotice;
  }

  /** Resolves with the code when the server has ended the line for good. */
  async end(): Promise<number> {
    await this.until(() => this.closed !== null, 'the line was not ended');
    return this.closed?.code ?? 0;
  }

  /** Sends bytes as they are, past everything the provider would do. */
  sendRaw(bytes: Uint8Array): void {
    (this.provider.ws as unknown as WebSocket).send(bytes);
  }

  close(): void {
    this.provider.destroy();
    this.doc.destroy();
  }

  #lineInWords(): string {
    if (this.closed !== null) return `ended with ${this.closed.code} (${this.closed.reason})`;
    const { wsconnected, synced } = this.provider;
    return wsconnected ? (synced ? 'in step' : 'open') : 'down';
  }

  #take({ whole, cells, gone }: PlanNotice): void {
    if (whole) this.plan.clear();
    for (const id of gone ?? []) this.plan.delete(id);
    for (const cell of cells) this.plan.set(cell.id, cell);
  }

  #handle(type: number, read: (decoder: Decoder) => void): void {
    this.provider.messageHandlers[type] = (_encoder, decoder) => {
      read(decoder);
      this.#tell();
    };
  }

  #tell(): void {
    for (const check of [...this.#heard]) check();
  }
}
