import type { CellInput, CellJob, CellOutcome } from '@stillroom/shared/cells';
import { limits } from '@stillroom/shared/protocol';
import { Logger as QueueLogger, run, type Runner as QueueRunner, type TaskList } from 'graphile-worker';
import type { Connections } from '../../database/connections.ts';
import { describeError, type Logger } from '../../logger.ts';
import type { Pool } from './pool/index.ts';
import { laneOf, lanes, type QueuedJob, queuedJob, type RunOwner, type RunQueue } from './queue.ts';
import type { ResultStore } from './results.ts';

/** Runs that end sooner than this, in milliseconds, are not announced as begun. */
const worthSaying = 120;
/** Runs of the long kinds that a process has in hand, for each of its workers. */
const inHand = 12;
/** Further tasks at the same time. */
const tasksAtOnce = 4;
/** How often runs of processes that are no more are looked for, in milliseconds. */
const sweeping = 15_000;

export interface RunnerOptions {
  /** Connections of this process for computing; their name is how others see whether it is still there. */
  readonly connections: Connections;
  readonly host: string;
  readonly pool: Pool;
  /** Workers of the pool. */
  readonly size: number;
  readonly queue: RunQueue;
  readonly results: ResultStore;
  readonly log: Logger;
  /** Called in this process when something is known under a digest, before it is kept. */
  readonly told: (digest: string) => void;
  /** Further tasks, which only wait for runs of the pool: some at a time beside the lanes. */
  readonly tasks: (pool: Pool, host: string) => TaskList;
}

/** Takes runs from the queue and has the pool compute them. */
export class Runner {
  readonly #options: RunnerOptions;
  readonly #running = new Map<string, AbortController>();
  /** Runs taken up past the queue. */
  #taken = 0;
  #stopped = false;
  #runners: QueueRunner[] = [];
  #sweeper: NodeJS.Timeout | null = null;

  constructor(options: RunnerOptions) {
    this.#options = options;
  }

  async start(): Promise<void> {
    const { size, queue, pool } = this.#options;
    const tasks = this.#options.tasks(pool, this.#options.host);
    const compute = (payload: unknown) => {
      const queued = payload as QueuedJob;
      return this.#compute(queued, queue.begin(queued.job.digest, this.#options.host));
    };
    // More than begin at once: the pool decides which of them does, and takes no place for one that waits.
    const long = inHand * size;
    this.#runners = [
      await this.#serve({ [lanes.long]: compute }, long),
      await this.#serve({ [lanes.quick]: compute }, size + 1),
    ];
    if (Object.keys(tasks).length > 0) this.#runners.push(await this.#serve(tasks, tasksAtOnce));
    await queue.sweep();
    this.#sweeper = setInterval(
      () =>
        void queue.sweep().catch((error: unknown) => this.#complain('The queue could not be swept.', error)),
      sweeping,
    );
    this.#sweeper.unref();
  }

  /** Ends a run of this process; one of another is none of its business. */
  end(digest: string, by: 'stop' | 'unwanted'): void {
    this.#running.get(digest)?.abort(by);
  }

  /** Lets go of everything under way: it is queued again by whoever still needs it. */
  async stop(): Promise<void> {
    this.#stopped = true;
    if (this.#sweeper !== null) clearInterval(this.#sweeper);
    for (const controller of this.#running.values()) controller.abort('unwanted');
    await Promise.all(this.#runners.map((runner) => runner.stop()));
  }

  #serve(taskList: TaskList, concurrency: number): Promise<QueueRunner> {
    return run({
      pgPool: this.#options.connections.pool,
      taskList,
      concurrency,
      noHandleSignals: true,
      // News of jobs comes at once; this is for those whose news was lost.
      pollInterval: 5000,
      logger: this.#queueLogger(),
    });
  }

  /**
   * Takes a run up at once, where it is of the quick kinds and a place is free: the way through the queue would take
   * longer than the run. False leaves it to the queue.
   */
  take(job: CellJob, owner: RunOwner): boolean {
    if (laneOf(job.kind) !== lanes.quick || this.#taken >= this.#options.size || this.#stopped) return false;
    this.#taken += 1;
    const recorded = this.#options.queue.record(job, owner, this.#options.host);
    void this.#compute(
      queuedJob(job, owner),
      recorded.then(() => true),
    )
      .catch((error: unknown) => this.#complain('A run could not be written down.', error))
      .finally(() => {
        this.#taken -= 1;
      });
    return true;
  }

  /** Runs a job while it is being marked as begun; `begun` is false where it was taken out of the queue meanwhile. */
  async #compute(queued: QueuedJob, begun: Promise<boolean>): Promise<void> {
    const { queue, results, told } = this.#options;
    const { job } = queued;
    const controller = new AbortController();
    this.#running.set(job.digest, controller);
    let start = performance.now();
    const taken = () => {
      start = performance.now();
    };
    const [outcome, wanted] = await Promise.all([
      this.#run(queued, controller.signal, taken).catch((error: unknown) => this.#broken(error)),
      begun.then((still) => {
        if (!still) controller.abort('unwanted');
        return still;
      }),
    ]);
    const took = performance.now() - start;
    this.#running.delete(job.digest);
    if (!wanted) return;
    if (controller.signal.reason === 'unwanted') return queue.finish(job, null, null, took);
    const json = outcome.result === undefined ? null : JSON.stringify(outcome.result);
    // Told here before it is kept: whoever loses it in a crash computes the same again.
    results.learn(job, outcome, json, took);
    told(job.digest);
    await queue.finish(job, outcome, json, took);
  }

  /** `taken` is called when a worker takes the run up: until then it waits for its turn. */
  async #run(queued: QueuedJob, signal: AbortSignal, taken: () => void): Promise<CellOutcome> {
    const { pool } = this.#options;
    const job = await this.#withResults(queued);
    if (job === null) return missing;
    let since = new Date();
    let begun: NodeJS.Timeout | undefined;
    const say = (share: number | null, words: string | null) =>
      void this.#options.queue
        .move(job.digest, since.toISOString(), share, words)
        .catch((error: unknown) => this.#complain('Progress could not be told.', error));
    const onBegin = () => {
      taken();
      since = new Date();
      begun = setTimeout(() => say(null, null), worthSaying);
    };
    try {
      return await pool.run(job, {
        deadline: limits.deadlineUsual,
        owner: queued.group,
        part: queued.notebook,
        signal,
        onBegin,
        onProgress: ({ share, words }) => say(share ?? null, words ?? null),
      });
    } finally {
      clearTimeout(begun);
    }
  }

  /** Puts the results of its inputs back into a job; null where one is not there any more. */
  async #withResults({ job, results: names }: QueuedJob): Promise<CellJob | null> {
    const inputs: Record<string, CellInput> = { ...job.inputs };
    for (const name of names) {
      const input = inputs[name];
      const digest = input?.digest ?? null;
      const text = digest === null ? null : await this.#options.results.text(digest);
      if (input === undefined || text === null) return null;
      inputs[name] = { ...input, result: JSON.parse(text) as unknown };
    }
    return { ...job, inputs };
  }

  #broken(error: unknown): CellOutcome {
    this.#complain('A run broke off.', error);
    return {
      status: 'failed',
      error: {
        message: 'The engine could not run this cell.',
        hint: 'Bring it up to date to try again; the operator finds the cause in the log.',
      },
      warnings: [],
      keep: false,
    };
  }

  #complain(words: string, error: unknown): void {
    this.#options.log.error(words, describeError(error));
  }

  /** The queue's own lines: only what went wrong. */
  #queueLogger(): QueueLogger {
    return new QueueLogger(() => (level, message) => {
      if (level === 'error') this.#options.log.error(`Queue: ${message}`);
      // Jobs share few connections on purpose: a run holds none while the engine computes.
      else if (level === 'warning' && !message.includes('maxPoolSize')) {
        this.#options.log.warn(`Queue: ${message}`);
      }
    });
  }
}

const missing: CellOutcome = {
  status: 'failed',
  error: { message: 'A result it draws on is not there any more.', hint: 'Bring it up to date.' },
  warnings: [],
  keep: false,
};
