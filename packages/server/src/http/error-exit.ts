import { randomUUID } from 'node:crypto';
import type { ErrorBody } from '@stillroom/shared/contracts';
import type { ErrorRequestHandler } from 'express';
import { statusOf } from '../error-map.ts';
import { conflict, DomainError, invalid, tooLarge } from '../errors.ts';
import { describeError, type Logger } from '../logger.ts';

/** The one way out for every refusal; what is unknown is logged under a number and hidden behind it. */
export function errorExit(log: Logger): ErrorRequestHandler {
  return (error: unknown, request, response, next) => {
    if (response.headersSent) return next(error);
    const known = asDomainError(error);
    if (known === null) {
      const number = randomUUID().slice(0, 8);
      log.error('A request failed.', {
        number,
        method: request.method,
        path: request.path,
        ...describeError(error),
      });
      return send(500, {
        error: 'internal',
        message: 'Something went wrong on the server; nothing was changed.',
        hint: `Try again. If it stays, give the operator this number: ${number}.`,
      });
    }
    send(statusOf[known.id], { error: known.id, message: known.message, ...known.details });

    function send(status: number, body: ErrorBody): void {
      response.status(status).set('Cache-Control', 'no-store').json(body);
    }
  };
}

/** Our own refusals, and those of the libraries that read requests. */
function asDomainError(error: unknown): DomainError | null {
  if (error instanceof DomainError) return error;
  if (!(error instanceof Error)) return null;
  const { type, code } = error as Error & { type?: string; code?: string };
  if (type === 'entity.too.large' || code === 'LIMIT_FILE_SIZE') {
    return tooLarge('What was sent is too large.', { hint: 'Send less at once.' });
  }
  if (type === 'entity.parse.failed') return invalid('What was sent is not valid JSON.');
  if (type === 'encoding.unsupported' || type === 'charset.unsupported' || error instanceof URIError) {
    return invalid('What was sent cannot be read.');
  }
  // PostgreSQL: a character that no text column, or no JSON column, holds.
  if (code === '22021' || code === '22P05')
    return invalid('There is a character in it that cannot be kept.', { hint: 'Type the words anew.' });
  // PostgreSQL: two people took the same name, address or number at once, and this is the later one.
  if (code === '23505')
    return conflict('Somebody else has just taken that.', { hint: 'Look again, then try once more.' });
  return code?.startsWith('LIMIT_') ? invalid('The upload is not as expected: one file, no more.') : null;
}
