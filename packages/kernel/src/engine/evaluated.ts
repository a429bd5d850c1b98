import type { CellError } from '@stillroom/shared/cells';

/** What a kind gives back: its result, what to warn of, and why it is not what was asked for. */
export interface Evaluated {
  readonly result: unknown;
  readonly warnings?: readonly string[];
  /** Set where the run was ended before its time and `result` is what there was. */
  readonly ended?: CellError;
  /** Set where the cell failed by itself, as any run of it would, and `result` is what it left before. */
  readonly failed?: CellError;
}
