/**
 * The body of every refused request: a stable id for programs, a message for people (what happened, what to do),
 * and for a field of a form, which one.
 */
export interface ErrorBody {
  readonly error: ErrorId;
  readonly message: string;
  readonly hint?: string;
  readonly fields?: Readonly<Record<string, string>>;
}

export type ErrorId =
  | 'invalid'
  | 'signed-out'
  | 'wrong-password'
  | 'unconfirmed'
  | 'forbidden'
  | 'not-found'
  | 'gone'
  | 'conflict'
  | 'too-large'
  | 'too-many'
  | 'unavailable'
  | 'internal';
