import type { ErrorId } from '@stillroom/shared/contracts';

/** The HTTP status of every error id. */
export const statusOf: Readonly<Record<ErrorId, number>> = {
  invalid: 400,
  'signed-out': 401,
  'wrong-password': 401,
  unconfirmed: 403,
  forbidden: 403,
  'not-found': 404,
  gone: 410,
  conflict: 409,
  'too-large': 413,
  'too-many': 429,
  unavailable: 503,
  internal: 500,
};
