import { fileURLToPath } from 'node:url';
import { endedOutcome, findIsolation, type Isolation, type IsolationOptions } from '@stillroom/kernel/worker';
import type { CellJob, CellOutcome } from '@stillroom/shared/cells';
import { Turns, type Waiting } from './turns.ts';
import type { Pool, PoolOptions, RunOptions, WorkerView } from './types.ts';
import { Worker } from './worker.ts';

/** Where the build leaves the engine; the same seen from src and from dist. */
const builtEngine = fileURLToPath(new URL('../../../../../kernel/.build/worker', import.meta.url));
const usualMemory = 1536 * 1024 * 1024;
/** Milliseconds between attempts to start a worker that did not come up, at first and at most. */
const retry = { first: 200, most: 15_000 } as const;

interface Task extends Waiting {
  readonly job: CellJob;
  readonly options: RunOptions;
  readonly resolve: (outcome: CellOutcome) => void;
}

/** Workers that are kept warm, one more than may compute at once, so that one that is ended is not missed. */
class WarmPool implements Pool {
  private confined: Isolation | null = null;
  private readonly options: IsolationOptions;
  private readonly size: number;
  private readonly all = new Set<Worker>();
  private readonly turns = new Turns<Task>();
  private starting = 0;
  private computing = 0;
  private attempts = 0;
  private closed = false;

  constructor(options: IsolationOptions, size: number) {
    this.options = options;
    this.size = size;
    this.refill();
  }

  get isolation(): string {
    return this.confined?.words ?? 'Being tried out.';
  }

  run(job: CellJob, options: RunOptions): Promise<CellOutcome> {
    if (this.closed || options.signal?.aborted === true) {
      return Promise.resolve(endedOutcome('stop', options.deadline));
    }
    return new Promise((resolve) => {
      const task: Task = { job, options, resolve, owner: options.owner ?? '' };
      options.signal?.addEventListener(
        'abort',
        () => {
          if (this.turns.remove(task)) resolve(endedOutcome('stop', options.deadline));
        },
        { once: true },
      );
      this.turns.add(task);
      this.dispatch();
    });
  }

  workers(): readonly WorkerView[] {
    return [...this.all].map((worker) => worker.view());
  }

  waiting(): ReadonlyMap<string, number> {
    return this.turns.waiting();
  }

  async close(): Promise<void> {
    this.closed = true;
    for (const { resolve, options } of this.turns.drain()) resolve(endedOutcome('stop', options.deadline));
    const workers = [...this.all];
    workers.forEach(({ process }) => process.kill());
    await Promise.all(workers.map(({ process }) => process.gone));
  }

  private dispatch(): void {
    while (this.computing < this.size) {
      const worker = [...this.all].find(({ free }) => free);
      const task = worker === undefined ? undefined : this.turns.next();
      if (worker === undefined || task === undefined) return;
      this.computing++;
      void this.runTask(worker, task);
    }
  }

  private async runTask(worker: Worker, task: Task): Promise<void> {
    const outcome = await worker.run(task.job, task.options);
    this.computing--;
    this.turns.done(task);
    task.resolve(outcome);
    this.dispatch();
  }

  /** Starts what is missing: at first one worker alone, which finds out how workers can be confined. */
  private refill(): void {
    const wanted = this.confined === null ? 1 : this.size + 1;
    while (!this.closed && this.all.size + this.starting < wanted) void this.startOne();
  }

  private async startOne(): Promise<void> {
    this.starting++;
    try {
      this.confined ??= await findIsolation(this.options);
      const worker = await Worker.start(this.confined.command);
      this.attempts = 0;
      this.all.add(worker);
      void worker.process.gone.then(() => {
        this.all.delete(worker);
        this.refill();
      });
      if (this.closed) worker.process.kill();
    } catch (error) {
      this.startFailed(error);
      return;
    } finally {
      this.starting--;
    }
    this.dispatch();
    this.refill();
  }

  /** Whoever waits for a worker that cannot be had is told; another attempt follows after a while. */
  private startFailed(error: unknown): void {
    const message = error instanceof Error ? error.message : String(error);
    const hint = 'The operator has to look at this; it is tried again by itself.';
    if (this.all.size === 0) {
      for (const { resolve } of this.turns.drain()) {
        resolve({ status: 'failed', error: { message, hint }, warnings: [], keep: false });
      }
    }
    const pause = Math.min(retry.most, retry.first * 2 ** this.attempts++);
    setTimeout(() => this.refill(), pause).unref();
  }
}

/**
 * Starts the engine's workers of this process: confined as far as this machine allows (`isolation` says how far), kept warm,
 * each running one job at a time, ended from outside at its deadline and replaced. Runs may be asked for at once; they
 * begin when a worker is ready, and fail in words where none comes up.
 */
export function createPool({
  size,
  engineFolder = builtEngine,
  stateFolder,
  memory = usualMemory,
}: PoolOptions): Pool {
  const options = { folder: engineFolder, memory, ...(stateFolder === undefined ? {} : { stateFolder }) };
  return new WarmPool(options, Math.max(1, size));
}
