/**
 * Why the server ends a live connection. The live client treats 4400–4499 as final and 4500–4599 as "later".
 */
export const closeCodes = {
  /** Nobody is signed in, or the session has ended. */
  signedOut: 4401,
  /** The person may not do this (any more): what was refused is set aside by the client. */
  refused: 4403,
  /** The notebook is not there (any more). */
  gone: 4404,
  /** A message that is not of this protocol. */
  malformed: 4422,
  /** More than a connection may send. */
  tooMuch: 4429,
  /** One person has as many lines open as one may have. */
  crowded: 4430,
  /** The server is stopping or has lost its database; come back by yourself. */
  later: 4503,
} as const;
export type CloseCode = (typeof closeCodes)[keyof typeof closeCodes];
