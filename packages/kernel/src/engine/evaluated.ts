import type { CellError } from '@stillroom/shared/cells';

/** What a kind gives back: its result, what to warn of, and why it is only part of what was asked for. */
export interface Evaluated {
  readonly result: unknown;
  readonly warnings?: readonly string[];
  /** Set where the run was ended before its time and `result` is what there was. */
  readonly ended?: CellError;
}
