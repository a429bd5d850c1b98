/**
 * Types of live messages: the first variable-length integer of a frame. 0 and 1 are those of y-protocols (sync,
 * awareness); the rest are ours. 4 and 5 go from server to client only; bodies after the type are as said.
 */
export const messageTypes = {
  sync: 0,
  awareness: 1,
  /** varUint: how many of this connection's document frames (sync step 2 and update) are committed. */
  kept: 4,
  /** varString: JSON of `PlanNotice`. */
  plan: 5,
  /** varString: JSON of `Notice`: something else about this notebook changed; fetch it anew. */
  notice: 6,
} as const;

/** The five states of a computed cell; prose is always `current` or `failed`. */
export type CellState = 'current' | 'stale' | 'working' | 'failed' | 'held';

/** What the planner says of one cell. */
export interface CellNotice {
  readonly id: string;
  readonly state: CellState;
  /** Digest the cell has now; null where it cannot have one (cycle, missing name, failed input). */
  readonly digest: string | null;
  /** Digest of the last good result, to be shown (also while stale, working or failed); null where there is none. */
  readonly shown: string | null;
  /** Ids of the cells it draws on, in order of first mention. */
  readonly draws: readonly string[];
  /** Why it failed or cannot run: words for the author. */
  readonly error?: CellError;
  /** For a working cell: ISO time it began, share done 0..1 when known, and words. */
  readonly since?: string;
  readonly progress?: number;
  readonly words?: string;
  /** For a held cell: who holds it and since when (ISO). */
  readonly heldBy?: string;
  /** How long the shown result took, in milliseconds. */
  readonly took?: number;
  /**
   * Small results ride along, so that a co-author sees them without another request. With a failed cell: what the
   * failed run left, such as what a script had printed; never the result under `shown`.
   */
  readonly result?: unknown;
  readonly warnings?: readonly string[];
}

/** An error of a cell, as in the results format; `partial` marks a run that left part of its result. */
export interface CellError {
  readonly message: string;
  readonly line?: number;
  readonly column?: number;
  readonly hint?: string;
}

/** The whole plan on joining (`whole: true`), afterwards only cells that changed; `gone` lists removed ids. */
export interface PlanNotice {
  readonly whole: boolean;
  readonly cells: readonly CellNotice[];
  readonly gone?: readonly string[];
}

/** Topics a client may fetch anew when told. */
export type NoticeTopic = 'remarks' | 'records' | 'access' | 'notebook';
export interface Notice {
  readonly topic: NoticeTopic;
}

/** Awareness state of a person at a notebook, beside the cursor that y-codemirror keeps under `cursor`. */
export interface Presence {
  readonly user: {
    readonly id: string;
    readonly name: string;
    readonly initials: string;
    readonly hue: number;
  };
  /** Cell the person is in, if any. */
  readonly cell: string | null;
}
