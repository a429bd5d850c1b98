import type { CellJob } from '@stillroom/shared/cells';
import type { Demand } from './demand.ts';
import type { RunOwner } from './queue.ts';
import type { Known, ResultStore } from './results.ts';

export interface TrialsOptions {
  readonly results: Pick<ResultStore, 'find'>;
  readonly demand: Pick<Demand, 'want' | 'settle' | 'release'>;
  readonly submit: (job: CellJob, owner: RunOwner) => Promise<void>;
}

/**
 * Runs that one person waits for and no cell shows: a cell with other values, tried. They stand in the queue like any
 * other run of their group, and end when the person has moved on to another value.
 */
export class Trials {
  readonly #options: TrialsOptions;
  readonly #waiting = new Map<string, Set<() => void>>();

  constructor(options: TrialsOptions) {
    this.#options = options;
  }

  /** Something may be known under a digest now, or its run has ended without. */
  resultChanged(digest: string): void {
    for (const wake of this.#waiting.get(digest) ?? []) wake();
  }

  /** What a job comes to; null where it was given up (`signal`) or its run ended without an outcome. */
  async run(job: CellJob, owner: RunOwner, signal: AbortSignal): Promise<Known | null> {
    const { results, demand, submit } = this.#options;
    const { digest } = job;
    const known = async () => (await results.find([digest])).get(digest) ?? null;
    const before = await known();
    if (before?.kept === true || signal.aborted) return before;
    const news = this.#news(digest, signal);
    const who = {};
    demand.want(digest, who);
    try {
      await submit(job, owner);
      await news.come;
      return signal.aborted ? null : await known();
    } finally {
      news.forget();
      if (signal.aborted) demand.release(digest, who);
      else demand.settle(digest, who);
    }
  }

  #news(digest: string, signal: AbortSignal): { come: Promise<void>; forget(): void } {
    let wake: () => void = () => undefined;
    const come = new Promise<void>((resolve) => (wake = resolve));
    const waiting = this.#waiting.get(digest) ?? new Set();
    this.#waiting.set(digest, waiting.add(wake));
    signal.addEventListener('abort', wake, { once: true });
    return {
      come,
      forget: () => {
        signal.removeEventListener('abort', wake);
        waiting.delete(wake);
        if (waiting.size === 0) this.#waiting.delete(digest);
      },
    };
  }
}
