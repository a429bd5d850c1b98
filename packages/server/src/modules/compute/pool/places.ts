import type { CellKind } from '@stillroom/shared/cells';

/** Kinds that may take long; all others are answered at once as a rule. */
const longKinds: ReadonlySet<CellKind> = new Set(['balance', 'trajectory', 'script']);
export const isLong = (kind: CellKind): boolean => longKinds.has(kind);

/** A run as its place is decided. */
export interface Placed {
  readonly kind: CellKind;
  readonly owner: string;
}

/** Places for runs that take longer, beside those for runs that have just begun. */
export const slowPlaces = (size: number): number => size + 1;
/** Runs of the long kinds that may have just begun at the same time: one place is left to the others. */
export const longPlaces = (size: number): number => Math.max(1, size - 1);

/**
 * Who may begin, so that nothing short waits behind something endless. A run begins in one of `size` prompt places, of
 * which the long kinds leave one to the quick ones. One that has not ended soon moves to a slow place, where it goes on at
 * low priority, and its prompt place is free again; one owner leaves one slow place to others.
 */
export class Places {
  readonly #size: number;
  readonly #prompt = new Set<Placed>();
  readonly #slow = new Set<Placed>();

  constructor(size: number) {
    this.#size = size;
  }

  /** How many runs are in slow places. */
  get slow(): number {
    return this.#slow.size;
  }

  /** Whether this run may begin in a prompt place now. */
  mayBegin(run: Placed): boolean {
    if (this.#prompt.size >= this.#size) return false;
    return (
      !isLong(run.kind) ||
      [...this.#prompt].filter(({ kind }) => isLong(kind)).length < longPlaces(this.#size)
    );
  }

  /** Whether a slow place is free for this run. */
  maySlowDown({ owner }: Placed): boolean {
    const all = slowPlaces(this.#size);
    const own = [...this.#slow].filter((run) => run.owner === owner).length;
    return this.#slow.size < all && own < all - 1;
  }

  /** Gives a run a prompt place. */
  begin(run: Placed): void {
    this.#prompt.add(run);
  }

  /** Gives a run a slow place in place of what it has. */
  slowDown(run: Placed): void {
    this.#prompt.delete(run);
    this.#slow.add(run);
  }

  end(run: Placed): void {
    this.#prompt.delete(run);
    this.#slow.delete(run);
  }
}
