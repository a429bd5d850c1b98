import type { CellError } from '@stillroom/shared/cells';

/** A cell that cannot give its result, in words for its author. Thrown inside a cell and caught by `evaluateCell`. */
export class CellFailure extends Error {
  readonly words: CellError;

  constructor(message: string, rest: Omit<CellError, 'message'> = {}) {
    super(message);
    this.name = 'CellFailure';
    this.words = { message, ...rest };
  }
}
