import type { ErrorId } from '@stillroom/shared/contracts';

interface Details {
  /** What to do next, as a sentence. */
  readonly hint?: string;
  /** For a form: what is wrong with which field. */
  readonly fields?: Readonly<Record<string, string>>;
}

/** A refusal meant to be read by the person who asked. Knows no HTTP: `error-map.ts` does. */
export class DomainError extends Error {
  override readonly name = 'DomainError';
  readonly id: ErrorId;
  readonly details: Details;

  constructor(id: ErrorId, message: string, details: Details = {}) {
    super(message);
    this.id = id;
    this.details = details;
  }
}

const kind =
  (id: ErrorId) =>
  (message: string, details?: Details): DomainError =>
    new DomainError(id, message, details);

/** What was sent cannot be used. */
export const invalid = kind('invalid');
/** Nobody is signed in. */
export const signedOut = (): DomainError =>
  new DomainError('signed-out', 'You are not signed in.', { hint: 'Sign in and try again.' });
export const wrongPassword = kind('wrong-password');
export const unconfirmed = kind('unconfirmed');
/** The person is known and may not do this. */
export const forbidden = kind('forbidden');
/** It is not there, or the person may not know that it is. */
export const notFound = (what: string): DomainError =>
  new DomainError('not-found', `There is no such ${what}, or you may not see it.`, {
    hint: 'Check the address, or ask a lead of the group for access.',
  });
/** It was there: a link that was used, withdrawn or has run out. */
export const gone = kind('gone');
/** It cannot be done in the present state. */
export const conflict = kind('conflict');
export const tooLarge = kind('too-large');
export const tooMany = kind('too-many');
export const unavailable = kind('unavailable');
