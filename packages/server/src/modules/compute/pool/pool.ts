import { fileURLToPath } from 'node:url';
import { endedOutcome, findIsolation, type Isolation, type IsolationOptions } from '@stillroom/kernel/worker';
import type { CellJob, CellOutcome } from '@stillroom/shared/cells';
import { Places, type Placed } from './places.ts';
import { Turns, type Waiting } from './turns.ts';
import type { Pool, PoolOptions, RunOptions, WorkerView } from './types.ts';
import { Worker } from './worker.ts';

/** Where the build leaves the engine; the same seen from src and from dist. */
const builtEngine = fileURLToPath(new URL('../../../../../kernel/.build/worker', import.meta.url));
const usualMemory = 1536 * 1024 * 1024;
/** Milliseconds between attempts to start a worker that did not come up, at first and at most. */
const retry = { first: 200, most: 15_000 } as const;

/** Milliseconds after which a run has not ended soon: nearly all runs do. */
const usualPromptness = 1000;

interface Task extends Waiting, Placed {
  readonly job: CellJob;
  readonly options: RunOptions;
  readonly resolve: (outcome: CellOutcome) => void;
}

/** Workers that are kept warm, one more than may begin at once, so that one that is ended is not missed. */
class WarmPool implements Pool {
  private confined: Isolation | null = null;
  private readonly options: IsolationOptions;
  private readonly size: number;
  private readonly all = new Set<Worker>();
  private readonly turns = new Turns<Task>();
  /** Runs that were broken off, and begin anew in a slow place. */
  private readonly slowTurns = new Turns<Task>();
  private readonly places: Places;
  private readonly promptly: number;
  private starting = 0;
  private attempts = 0;
  private closed = false;

  constructor(options: IsolationOptions, size: number, promptly: number) {
    this.options = options;
    this.size = size;
    this.places = new Places(size);
    this.promptly = promptly;
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
      const { owner = '', part = '' } = options;
      const task: Task = { job, options, resolve, owner, part, kind: job.kind };
      options.signal?.addEventListener(
        'abort',
        () => {
          if (this.turns.remove(task) || this.slowTurns.remove(task))
            resolve(endedOutcome('stop', options.deadline));
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
    const all = new Map(this.turns.waiting());
    for (const [owner, count] of this.slowTurns.waiting()) all.set(owner, (all.get(owner) ?? 0) + count);
    return all;
  }

  async close(): Promise<void> {
    this.closed = true;
    for (const { resolve, options } of this.drain()) resolve(endedOutcome('stop', options.deadline));
    const workers = [...this.all];
    workers.forEach(({ process }) => process.kill());
    await Promise.all(workers.map(({ process }) => process.gone));
  }

  private dispatch(): void {
    for (;;) {
      const worker = [...this.all].find(({ free }) => free);
      if (worker === undefined) return;
      const task = this.turns.next((one) => this.places.mayBegin(one));
      if (task !== undefined) {
        this.places.begin(task);
        void this.runPromptly(worker, task);
        continue;
      }
      const slow = this.slowTurns.next((one) => this.places.maySlowDown(one));
      if (slow === undefined) return;
      this.places.slowDown(slow);
      void this.runSlowly(worker, slow);
    }
  }

  /**
   * Runs a task in a prompt place. When it has not ended soon, it goes on in a slow place; where none is free and somebody
   * waits, it is broken off and begins anew once there is one: the same run comes to the same.
   */
  private async runPromptly(worker: Worker, task: Task): Promise<void> {
    let setAside = false;
    const late = setInterval(() => {
      if (this.places.maySlowDown(task)) {
        clearInterval(late);
        this.places.slowDown(task);
        worker.putBack();
        // Another worker takes the place that it leaves.
        this.refill();
        this.dispatch();
      } else if (this.turns.size > 0) {
        clearInterval(late);
        setAside = true;
        worker.process.kill();
      }
    }, this.promptly);
    const outcome = await worker.run(task.job, task.options);
    clearInterval(late);
    this.turns.done(task);
    this.places.end(task);
    const { signal, deadline } = task.options;
    if (!setAside) task.resolve(outcome);
    else if (this.closed || signal?.aborted === true) task.resolve(endedOutcome('stop', deadline));
    else this.slowTurns.add(task);
    this.dispatch();
  }

  private async runSlowly(worker: Worker, task: Task): Promise<void> {
    worker.putBack();
    this.refill();
    const outcome = await worker.run(task.job, task.options);
    this.slowTurns.done(task);
    this.places.end(task);
    task.resolve(outcome);
    this.dispatch();
  }

  private drain(): Task[] {
    return [...this.turns.drain(), ...this.slowTurns.drain()];
  }

  /** Starts what is missing: at first one worker alone, which finds out how workers can be confined. */
  private refill(): void {
    const wanted = this.confined === null ? 1 : this.size + 1 + this.places.slow;
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
      for (const { resolve } of this.drain()) {
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
  promptly = usualPromptness,
}: PoolOptions): Pool {
  const options = { folder: engineFolder, memory, ...(stateFolder === undefined ? {} : { stateFolder }) };
  return new WarmPool(options, Math.max(1, size), promptly);
}
