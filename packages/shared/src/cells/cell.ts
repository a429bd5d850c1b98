import type { CellError } from '../protocol/messages.ts';
import type { CellKind } from './kind.ts';

/** Settings of a cell as plain JSON; `cellRegistry[kind].settings` says what they may hold. */
export type CellSettings = Readonly<Record<string, unknown>>;

/**
 * What a cell draws on, as the engine gets it: the source of the cell named, and its result where the kind that draws
 * reads results. `failed` stands where there is no result because that cell failed or cannot be computed.
 */
export interface CellInput {
  readonly kind: CellKind;
  /** Digest of the cell drawn on; null where it cannot have one. */
  readonly digest: string | null;
  /** Its text as digested (`sourceText`). */
  readonly text: string;
  /** Its text as written, where it differs: for the places of errors and nothing else. */
  readonly written?: string;
  readonly result?: unknown;
  readonly failed?: CellError;
}

/** Everything one evaluation may depend on; nothing else may change its result. */
export interface CellJob {
  /** "sha256:…" over { engine, kind, text, settings, draws }; also the seed of a script's `random()`. */
  readonly digest: string;
  readonly kind: CellKind;
  /** The text as digested: NFC, LF, no trailing blanks; for a readable network its canonical print. */
  readonly text: string;
  /** The text as written, where it differs: for the places of errors and nothing else. */
  readonly written?: string;
  readonly settings: CellSettings;
  /** By the name under which the text or the settings speak of the cell. */
  readonly inputs: Readonly<Record<string, CellInput>>;
}

interface OutcomeBase {
  readonly warnings: readonly string[];
  /**
   * Whether this outcome may be kept under the job's digest: never for a run ended by its deadline, its memory or
   * Stop, nor for one that says "undecided" because such a run stands before it.
   */
  readonly keep: boolean;
}

/** How an evaluation ended. A failed run may leave part of its result (`partial: true`), which is never kept. */
export type CellOutcome =
  | (OutcomeBase & {
      readonly status: 'ok';
      readonly result: unknown;
      /** "sha256:…" of the RFC 8785 JSON of `result`. */
      readonly resultDigest: string;
    })
  | (OutcomeBase & {
      readonly status: 'failed';
      readonly error: CellError;
      readonly result?: unknown;
      readonly partial?: true;
    });

/** Why a run was ended from outside. */
export type EndedBy = 'deadline' | 'stop' | 'memory' | 'crash';
