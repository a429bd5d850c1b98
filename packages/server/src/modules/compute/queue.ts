import type { CellJob, CellKind, CellOutcome } from '@stillroom/shared/cells';
import { engineVersion } from '@stillroom/shared/plan';
import type { Queries } from '../notebooks/index.ts';
import { eventChannel } from '../../events.ts';
import { storableJson } from '../../database/storable.ts';
import { isLong } from './pool/index.ts';

/** Whose run it is and how it is called, for fair shares and for the operator. */
export interface RunOwner {
  readonly group: string;
  readonly notebook: string;
  readonly name: string;
}

/** A job as it waits: results of its inputs are left out and read again by digest when it runs. */
export interface QueuedJob {
  readonly job: CellJob;
  readonly group: string;
  readonly notebook: string;
  /** Names of the inputs whose results belong in. */
  readonly results: readonly string[];
}

/**
 * Two lanes, so that a long computation never keeps what is answered at once from its turn: the first lane also takes
 * the second's runs, not the other way round.
 */
export const lanes = { quick: 'cell-quick', long: 'cell-long' } as const;
export const laneOf = (kind: CellKind): string => (isLong(kind) ? lanes.long : lanes.quick);

/**
 * Runs that wait or are under way: a row in `cell_run` each, and a job of the queue that holds what to compute. One
 * run serves everybody who waits for its digest.
 */
export class RunQueue {
  readonly #queries: Queries;

  constructor(queries: Queries) {
    this.#queries = queries;
  }

  /**
   * Queues a run unless one is queued or under way. Groups take turns (start-time fair queueing): a group's next run
   * stands one turn after its last, and never before the turn that is being served.
   */
  async submit(job: CellJob, owner: RunOwner): Promise<void> {
    await this.#queries.query(
      `with next as (
         select greatest(
           coalesce((select max(turn) + 1 from cell_run where "group" = $2), 0),
           coalesce((select min(turn) from cell_run), 0)
         ) as turn
       ), run as (
         insert into cell_run (digest, "group", notebook, kind, name, turn)
         select $1, $2::uuid, $3::uuid, $4, $5, turn from next
         on conflict (digest) do nothing
         returning digest, turn
       )
       select graphile_worker.add_job($6, $7::json, job_key := digest, priority := turn, max_attempts := 1) from run`,
      [
        job.digest,
        owner.group,
        owner.notebook,
        job.kind,
        owner.name,
        laneOf(job.kind),
        storableJson(queuedJob(job, owner)),
      ],
    );
  }

  /**
   * Writes down a run that a process takes up at once, past the queue. Where the run is queued or under way already,
   * that stands.
   */
  async record(job: CellJob, owner: RunOwner, host: string): Promise<void> {
    await this.#queries.query(
      `insert into cell_run (digest, "group", notebook, kind, name, turn, started_at, host)
       values ($1, $2, $3, $4, $5, 0, clock_timestamp(), $6) on conflict (digest) do nothing`,
      [job.digest, owner.group, owner.notebook, job.kind, owner.name, host],
    );
  }

  /** When each of these runs began; null for one that waits; those that are not queued are left out. */
  async runs(digests: readonly string[]): Promise<Map<string, string | null>> {
    const rows = (await this.#queries.query(
      'select digest, started_at from cell_run where digest = any($1)',
      [digests],
    )) as { digest: string; started_at: Date | null }[];
    return new Map(rows.map(({ digest, started_at }) => [digest, started_at?.toISOString() ?? null]));
  }

  /** Ends a run: one that waits is taken out, one under way is told to the process that runs it. */
  async end(digest: string, by: 'stop' | 'unwanted'): Promise<void> {
    const [taken] = (await this.#queries.query(
      `with waiting as (delete from cell_run where digest = $1 and started_at is null returning digest, kind),
       removed as (select graphile_worker.remove_job(digest) from waiting)
       select kind from waiting left join removed on true`,
      [digest],
    )) as { kind: CellKind }[];
    if (taken === undefined) return this.#announce('run.ending', { digest, by });
    if (by === 'stop') {
      const error = { message: 'Stopped before it began.', hint: 'Bring it up to date to run it.' };
      await this.#attempt(
        { digest, kind: taken.kind },
        { status: 'failed', error, warnings: [], keep: false },
        null,
        0,
      );
    }
    await this.#announce('result.changed', { digest });
  }

  /** Marks a run as begun; false where it was taken out meanwhile. */
  async begin(digest: string, host: string): Promise<boolean> {
    const rows = (await this.#queries.query(
      `with begun as (
         update cell_run set started_at = clock_timestamp(), host = $2 where digest = $1 returning digest
       ) select digest from begun`,
      [digest, host],
    )) as unknown[];
    return rows.length > 0;
  }

  /**
   * Ends a run: keeps what it came to (null: nothing, nobody needed it any more), takes it out of the queue, counts its
   * time for its group, and tells everybody. `took` is in milliseconds.
   */
  async finish(job: Ran, outcome: CellOutcome | null, json: string | null, took: number): Promise<void> {
    if (outcome !== null && !outcome.keep) await this.#attempt(job, outcome, json, took);
    const kept = outcome?.keep === true ? outcome : null;
    await this.#queries.query(
      `with kept as (
         insert into cell_result (digest, kind, result, result_digest, error, warnings, took, engine)
         select $1, $2, $3, $4, $5, $6, $7, $8 where $9
         on conflict (digest) do nothing
       ), overcome as (
         delete from cell_attempt where digest = $1 and $9
       ), run as (
         delete from cell_run where digest = $1 returning "group"
       ), used as (
         insert into compute_use ("group", day, seconds, runs) select "group", current_date, $7 / 1000, 1 from run
         on conflict ("group", day) do update
           set seconds = compute_use.seconds + excluded.seconds, runs = compute_use.runs + 1
       )
       select pg_notify($10, $11)`,
      [
        ...columns(job, kept ?? nothing, kept === null ? null : json, took),
        engineVersion,
        kept !== null,
        eventChannel,
        JSON.stringify({ name: 'result.changed', payload: { digest: job.digest } }),
      ],
    );
  }

  /** Tells everybody that a run has begun or come further; of long words only as many as news may hold. */
  async move(digest: string, since: string, share: number | null, words: string | null): Promise<void> {
    await this.#announce('run.moved', { digest, since, share, words: words && shortened(words) });
  }

  /**
   * Takes out runs of processes that are no more. A process is known by the name of its connections, which end with
   * it.
   */
  async sweep(): Promise<void> {
    const dead = (await this.#queries.query(
      `with dead as (
         delete from cell_run where started_at is not null
           and host not in (select application_name from pg_stat_activity where application_name is not null)
         returning digest
       ), removed as (select graphile_worker.remove_job(digest) from dead)
       select digest from dead left join removed on true`,
    )) as { digest: string }[];
    for (const { digest } of dead) await this.#announce('result.changed', { digest });
  }

  /** Forgets what these came to where that is not kept, so that they can be run again. */
  async forgive(digests: readonly string[]): Promise<void> {
    await this.#queries.query('delete from cell_attempt where digest = any($1)', [digests]);
  }

  async #attempt(job: Ran, outcome: CellOutcome, json: string | null, took: number): Promise<void> {
    await this.#queries.query(
      `insert into cell_attempt (digest, kind, result, result_digest, error, warnings, took)
       values ($1, $2, $3, $4, $5, $6, $7)
       on conflict (digest) do update set result = excluded.result, result_digest = excluded.result_digest,
         error = excluded.error, warnings = excluded.warnings, took = excluded.took, at = now()`,
      columns(job, outcome, json, took),
    );
  }

  async #announce(name: string, payload: object): Promise<void> {
    await this.#queries.query('select pg_notify($1, $2)', [eventChannel, JSON.stringify({ name, payload })]);
  }
}

/** Characters of a run's words at most: PostgreSQL refuses news of 8,000 bytes, and a control character takes six. */
const mostWords = 400;

const shortened = (words: string): string =>
  words.length <= mostWords ? words : `${Array.from(words.slice(0, mostWords)).slice(0, -1).join('')}…`;

type Ran = Pick<CellJob, 'digest' | 'kind'>;

/** Fills the columns of an outcome that is not there. */
const nothing: CellOutcome = { status: 'failed', error: { message: '' }, warnings: [], keep: false };

/** An outcome as the tables hold it: digest, kind, result, its digest, error, warnings, time. */
function columns(job: Ran, outcome: CellOutcome, json: string | null, took: number): unknown[] {
  const ok = outcome.status === 'ok';
  return [
    job.digest,
    job.kind,
    json,
    ok ? outcome.resultDigest : null,
    ok ? null : storableJson(outcome.error),
    storableJson(outcome.warnings),
    took,
  ];
}

/** Splits a job from the results of its inputs, as it is queued. */
export function queuedJob(job: CellJob, { group, notebook }: RunOwner): QueuedJob {
  const results: string[] = [];
  const inputs = Object.fromEntries(
    Object.entries(job.inputs).map(([name, { result, ...input }]) => {
      if (result !== undefined) results.push(name);
      return [name, input];
    }),
  );
  return { job: { ...job, inputs }, group, notebook, results };
}
