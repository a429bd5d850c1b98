import type { CellJob, CellKind, CellOutcome } from '@stillroom/shared/cells';

export interface RunOptions {
  /** Seconds after the run begins at which it is ended from outside. */
  readonly deadline: number;
  /** Whose run it is (a group): owners take turns. */
  readonly owner?: string;
  /** What of the owner's it is for (a notebook): parts take turns too, the runs of each keep their order. */
  readonly part?: string;
  /** Share done 0..1 where known, and words; at most a few times a second. */
  readonly onProgress?: (progress: { readonly share?: number; readonly words?: string }) => void;
  /** Called when a worker takes the run up. */
  readonly onBegin?: () => void;
  /** Aborting is Stop: the run leaves what it has. A run that has not begun is dropped. */
  readonly signal?: AbortSignal;
}

/** One worker, for the operator's page. */
export interface WorkerView {
  readonly id: string;
  readonly state: 'idle' | 'working';
  readonly kind: CellKind | null;
  /** ISO time its run began. */
  readonly since: string | null;
  readonly owner: string | null;
}

/** The workers of this process. */
export interface Pool {
  /**
   * Runs a job in a worker and never rejects: a run ended by its deadline, its memory, Stop or a crash is a failed outcome
   * with `keep: false`, and with `partial: true` where it left part of its result.
   */
  run(job: CellJob, options: RunOptions): Promise<CellOutcome>;
  workers(): readonly WorkerView[];
  /** Runs waiting for a worker, by owner. */
  waiting(): ReadonlyMap<string, number>;
  /** How workers are kept from the rest of the machine, in words for the operator. */
  readonly isolation: string;
  /** Ends all workers; waiting runs fail with words. */
  close(): Promise<void>;
}

export interface PoolOptions {
  /**
   * Places for runs that have just begun; one more worker stands ready to take the place of one that is ended. Runs that
   * take longer go on in places of their own, see `places.ts`.
   */
  readonly size: number;
  /** Milliseconds after which a run gives up its place to those that wait. */
  readonly promptly?: number;
  /** Folder of the bundled engine; by default where the build leaves it. */
  readonly engineFolder?: string;
  /** Where a copy of the engine may be put for an account that cannot read `engineFolder`. */
  readonly stateFolder?: string;
  /** Bytes a worker may use, buffers and WebAssembly counted; by default 900 MB. */
  readonly memory?: number;
}
