import { EventEmitter } from 'node:events';
import pg from 'pg';
import type { EntityManager } from 'typeorm';
import { describeError, type Logger } from './logger.ts';

/**
 * Every domain event with its payload. Events travel through the database (NOTIFY), so that they reach every process,
 * and only once the transaction that announced them is committed. Payloads hold ids only: PostgreSQL refuses 8,000 bytes.
 */
export interface DomainEvents {
  /** What someone may do in a group changed: a role, its notebooks, or membership itself. */
  'access.changed': { readonly person: string; readonly group: string };
  /** Sessions of a person ended; `session` null means all of them but `except`. */
  'session.ended': {
    readonly person: string;
    readonly session: string | null;
    readonly except: string | null;
  };
  /** A letter was put into the outbox. */
  'mail.queued': Record<string, never>;
  /** A notebook was made with cells in it, none of them computed. */
  'notebook.created': { readonly notebook: string };
  /** Title, public link, bin: anything about a notebook beside its live document. */
  'notebook.changed': { readonly notebook: string };
  /** A remark on a notebook was written, answered or settled. */
  'remarks.changed': { readonly notebook: string };
  /** A record of a notebook was frozen, or a review of one moved on. */
  'records.changed': { readonly notebook: string };
  /** A result was kept under a digest, or its run failed, moved on or was stopped. */
  'result.changed': { readonly digest: string };
  /** A run began (`share` null) or came further; `share` is 0..1. */
  'run.moved': {
    readonly digest: string;
    readonly since: string;
    readonly share: number | null;
    readonly words: string | null;
  };
  /** A run is to end: by Stop, or since nobody needs it any more. */
  'run.ending': { readonly digest: string; readonly by: 'stop' | 'unwanted' };
  /** Updates of a live document were kept by the process `from`; ids are those of the log. */
  'updates.kept': {
    readonly from: string;
    readonly notebook: string;
    readonly first: string;
    readonly last: string;
    readonly rows: number;
  };
  /** Who is at a notebook by lines to the process `from`, as ids; told anew from time to time while somebody is. */
  'people.here': { readonly from: string; readonly notebook: string; readonly people: readonly string[] };
  /** What people at a notebook show of themselves by lines to the process `from`: client, clock, state as JSON. */
  'presence.moved': {
    readonly from: string;
    readonly notebook: string;
    readonly states: readonly (readonly [client: number, clock: number, state: string])[];
  };
}
export type EventName = keyof DomainEvents;

/** The one channel of NOTIFY; a statement that announces by itself sends `{ name, payload }` here. */
export const eventChannel = 'stillroom_events';

/** Tells every process, once `manager`'s transaction commits (at once where there is none). */
export async function announce<Name extends EventName>(
  manager: EntityManager,
  name: Name,
  payload: DomainEvents[Name],
): Promise<void> {
  await manager.query('select pg_notify($1, $2)', [eventChannel, JSON.stringify({ name, payload })]);
}

/** Bytes of one event at most, as sent: what PostgreSQL takes. */
export const eventBytes = 7999;

type Handler<Name extends EventName> = (payload: DomainEvents[Name]) => void;

/** The events as one process hears them. */
export interface Events {
  /** Hears an event until the returned function is called. */
  on<Name extends EventName>(name: Name, handler: Handler<Name>): () => void;
  /** Called after the line to the database was lost and is back: what happened meanwhile was not heard. */
  onGap(handler: () => void): () => void;
  start(): Promise<void>;
  stop(): Promise<void>;
}

/** Listens to the database at `url`; comes back by itself after the line was lost. */
export function createEvents(url: string, log: Logger): Events {
  const emitter = new EventEmitter();
  emitter.setMaxListeners(0);
  let client: pg.Client | null = null;
  let retry: NodeJS.Timeout | null = null;
  let stopped = false;

  const hear = (message: pg.Notification): void => {
    const { name, payload } = JSON.parse(message.payload ?? '{}') as { name: string; payload: unknown };
    emitter.emit(name, payload);
  };

  const connect = async (): Promise<void> => {
    const next = new pg.Client({ connectionString: url, application_name: 'stillroom events' });
    next.on('notification', hear);
    next.on('error', (error) => log.warn('The line for events was lost.', describeError(error)));
    next.on('end', () => {
      if (client === next) reconnect();
    });
    await next.connect();
    await next.query(`listen ${eventChannel}`);
    client = next;
  };

  const reconnect = (): void => {
    client = null;
    if (stopped || retry !== null) return;
    retry = setTimeout(() => {
      retry = null;
      connect().then(() => emitter.emit('gap'), reconnect);
    }, 500);
  };

  const on = <Payload>(name: string, handler: (payload: Payload) => void): (() => void) => {
    const guarded = (payload: Payload): void => {
      try {
        handler(payload);
      } catch (error) {
        log.error(`A listener of ${name} failed.`, describeError(error));
      }
    };
    emitter.on(name, guarded);
    return () => emitter.off(name, guarded);
  };

  return {
    on,
    onGap: (handler) => on('gap', handler),
    start: connect,
    async stop() {
      stopped = true;
      if (retry !== null) clearTimeout(retry);
      const last = client;
      client = null;
      await last?.end();
    },
  };
}
