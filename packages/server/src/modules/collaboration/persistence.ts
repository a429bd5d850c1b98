import * as Y from 'yjs';
import { eventChannel } from '../../events.ts';
import type { Queries } from '../notebooks/index.ts';

/** A database as compaction needs it. */
export interface Transactions extends Queries {
  transaction<T>(work: (queries: Queries) => Promise<T>): Promise<T>;
}

interface Entry {
  readonly notebook: string;
  readonly person: string | null;
  readonly update: Uint8Array;
  readonly committed: () => void;
  readonly failed: (error: unknown) => void;
}

/** Rows and bytes of one INSERT at most; both only bound memory, a usual batch has one or a few rows. */
const batchRows = 1000;
const batchBytes = 8 * 1024 * 1024;

/**
 * The log of every document update. One INSERT at a time for all notebooks; while it runs, what comes in gathers and
 * becomes the next one. No timer: a window would only add its own length to every acknowledgement.
 */
export class UpdateLog {
  readonly #queries: Queries;
  /** Names this process in the news of other processes. */
  readonly #origin: string;
  #waiting: Entry[] = [];
  #writing = false;
  /** Settles when everything appended so far has. */
  #last: Promise<void> = Promise.resolve();

  constructor(queries: Queries, origin: string) {
    this.#queries = queries;
    this.#origin = origin;
  }

  /** Queues an update; resolves when it is committed, rejects when the database refused it. */
  append(notebook: string, person: string | null, update: Uint8Array): Promise<void> {
    this.#last = new Promise<void>((committed, failed) => {
      this.#waiting.push({ notebook, person, update, committed, failed });
    });
    if (!this.#writing) void this.#write();
    return this.#last;
  }

  /** Resolves when everything appended so far is committed. */
  committed(): Promise<void> {
    return this.#last;
  }

  async #write(): Promise<void> {
    this.#writing = true;
    while (this.#waiting.length > 0) {
      const batch = this.#take();
      try {
        await this.#insert(batch);
        for (const entry of batch) entry.committed();
      } catch (error) {
        for (const entry of batch) entry.failed(error);
      }
    }
    this.#writing = false;
  }

  #take(): Entry[] {
    let rows = 0;
    let bytes = 0;
    for (const entry of this.#waiting) {
      bytes += entry.update.length;
      if (rows > 0 && (bytes > batchBytes || rows >= batchRows)) break;
      rows += 1;
    }
    return this.#waiting.splice(0, rows);
  }

  /** The news names the new rows, so that other processes that hold the notebook fetch exactly those. */
  async #insert(batch: readonly Entry[]): Promise<void> {
    await this.#queries.query(
      `with kept as (
         insert into notebook_update (notebook, person, update)
         select * from unnest($1::uuid[], $2::uuid[], $3::bytea[])
         returning id, notebook
       )
       select pg_notify($4, json_build_object('name', 'updates.kept', 'payload', json_build_object(
         'from', $5::text, 'notebook', notebook, 'first', min(id)::text, 'last', max(id)::text, 'rows', count(*)
       ))::text)
       from kept group by notebook`,
      [
        batch.map((entry) => entry.notebook),
        batch.map((entry) => entry.person),
        batch.map((entry) => Buffer.from(entry.update.buffer, entry.update.byteOffset, entry.update.length)),
        eventChannel,
        this.#origin,
      ],
    );
  }
}

/**
 * Merges the log of a notebook into its snapshot, in one transaction under the snapshot's row lock. The rows are taken
 * by `delete … returning`: a condition on ids would lose a lower id that becomes visible later. Who wrote, and when
 * last, moves to `notebook_author` and the notebook.
 */
export async function compact(database: Transactions, notebook: string): Promise<void> {
  await database.transaction(async (queries) => {
    const [kept] = (await queries.query(
      'select state from notebook_snapshot where notebook = $1 for update',
      [notebook],
    )) as { state: Uint8Array }[];
    const taken = (await queries.query(
      `with taken as (delete from notebook_update where notebook = $1 returning id, update, person, at),
       written as (
         insert into notebook_author (notebook, person, last_at)
         select $1, person, max(at) from taken where person is not null group by person
         on conflict (notebook, person) do update set last_at = greatest(notebook_author.last_at, excluded.last_at)
       ),
       dated as (
         update notebook set last_work_at = newest.at, last_work_by = newest.person
         from (select at, person from taken order by id desc limit 1) newest where notebook.id = $1
       )
       select update from taken order by id`,
      [notebook],
    )) as { update: Uint8Array }[];
    if (kept === undefined || taken.length === 0) return;
    const doc = new Y.Doc();
    doc.transact(() => {
      for (const bytes of [kept.state, ...taken.map(({ update }) => update)]) Y.applyUpdate(doc, bytes);
    });
    await queries.query('update notebook_snapshot set state = $2, at = now() where notebook = $1', [
      notebook,
      Buffer.from(Y.encodeStateAsUpdate(doc)),
    ]);
    doc.destroy();
  });
}
