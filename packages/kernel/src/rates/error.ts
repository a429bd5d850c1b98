/** A mistake of the author of a cell, in words for them: what is wrong and, as `hint`, what to do. */
export class RateError extends Error {
  readonly hint: string | null;

  constructor(message: string, hint: string | null = null) {
    super(message);
    this.name = 'RateError';
    this.hint = hint;
  }
}
