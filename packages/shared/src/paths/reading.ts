/** What could not be read in a path, a woven value or a claim; `at` is an offset in the text that was given. */
export interface Misreading {
  readonly message: string;
  readonly hint: string | null;
  readonly at: number;
}

/** Outcome of reading a text: never an exception. */
export type Reading<T> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly misreading: Misreading };

/** Thrown inside the readers of this room and caught at their doors. */
export class MisreadError extends Error {
  readonly at: number;
  readonly hint: string | null;
  constructor(message: string, at: number, hint: string | null = null) {
    super(message);
    this.at = at;
    this.hint = hint;
  }
}

/** Runs a reader and turns what it threw into a value. */
export function reading<T>(read: () => T): Reading<T> {
  try {
    return { ok: true, value: read() };
  } catch (error) {
    if (!(error instanceof MisreadError)) throw error;
    return { ok: false, misreading: { message: error.message, hint: error.hint, at: error.at } };
  }
}

/** 1-based line and column of an offset. */
export function lineAndColumn(text: string, offset: number): { line: number; column: number } {
  const before = text.slice(0, offset);
  const lastBreak = before.lastIndexOf('\n');
  return { line: before.split('\n').length, column: offset - lastBreak };
}
