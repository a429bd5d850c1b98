/** How long a run that nobody needs any more may go on, in milliseconds: most end by themselves sooner than a worker is replaced. */
const grace = 150;

/** Who needs which run. When nobody does any more, because the author typed on, the run is ended, so that the newest wins. */
export class Demand {
  readonly #end: (digest: string) => void;
  readonly #wanted = new Map<string, Set<object>>();
  readonly #timers = new Map<string, NodeJS.Timeout>();

  /** `end` is called for each run that nobody needs, some time after the last one let go of it. */
  constructor(end: (digest: string) => void) {
    this.#end = end;
  }

  want(digest: string, by: object): void {
    const wanters = this.#wanted.get(digest) ?? new Set();
    this.#wanted.set(digest, wanters.add(by));
    clearTimeout(this.#timers.get(digest));
    this.#timers.delete(digest);
  }

  /** The run came to its end: nothing is left to be ended. */
  settle(digest: string, by: object): void {
    this.#drop(digest, by);
  }

  /** It is not needed here any more. */
  release(digest: string, by: object): void {
    if (!this.#drop(digest, by)) return;
    const timer = setTimeout(() => {
      this.#timers.delete(digest);
      if (!this.#wanted.has(digest)) this.#end(digest);
    }, grace);
    timer.unref();
    this.#timers.set(digest, timer);
  }

  stop(): void {
    for (const timer of this.#timers.values()) clearTimeout(timer);
    this.#timers.clear();
  }

  /** Whether that was the last one who wanted it. */
  #drop(digest: string, by: object): boolean {
    const wanters = this.#wanted.get(digest);
    if (wanters === undefined || !wanters.delete(by) || wanters.size > 0) return false;
    this.#wanted.delete(digest);
    return true;
  }
}
