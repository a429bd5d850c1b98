import type { ErrorBody, ErrorId } from '@stillroom/shared/contracts';

/** A refused or failed request, with the server's own words for people. `status` is 0 when no answer came. */
export class RequestError extends Error {
  readonly status: number;
  readonly id: ErrorId;
  readonly hint: string | null;
  readonly fields: Readonly<Record<string, string>>;

  constructor(status: number, body: ErrorBody) {
    super(body.message);
    this.name = 'RequestError';
    this.status = status;
    this.id = body.error;
    this.hint = body.hint ?? null;
    this.fields = body.fields ?? {};
  }
}

const unreachable: ErrorBody = {
  error: 'unavailable',
  message: 'The server does not answer.',
  hint: 'Nothing is lost. Check the connection, then try again.',
};

async function bodyOf(response: Response): Promise<ErrorBody> {
  try {
    const body = (await response.json()) as Partial<ErrorBody>;
    if (typeof body.message === 'string' && typeof body.error === 'string') return body as ErrorBody;
  } catch {
    // Not our server's words (a proxy's page, an empty body): say what can be said.
  }
  return { ...unreachable, message: `The server answered with an error (${response.status}).` };
}

/**
 * One request to the server. Bodies are JSON unless a FormData is given; an answer without content gives undefined.
 * Throws `RequestError` with words for people for every refusal and for a lost line.
 */
export async function request<Answer>(
  method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE',
  path: string,
  body?: unknown,
  signal?: AbortSignal,
): Promise<Answer> {
  const form = body instanceof FormData;
  let response: Response;
  try {
    response = await fetch(path, {
      method,
      credentials: 'same-origin',
      headers: body === undefined || form ? {} : { 'content-type': 'application/json' },
      ...(body === undefined ? {} : { body: form ? body : JSON.stringify(body) }),
      ...(signal === undefined ? {} : { signal }),
    });
  } catch (cause) {
    if (signal?.aborted === true) throw cause;
    throw new RequestError(0, unreachable);
  }
  if (!response.ok) throw new RequestError(response.status, await bodyOf(response));
  if (response.status === 204 || response.status === 202) return undefined as Answer;
  return (await response.json()) as Answer;
}

/** The sentence to show for anything that went wrong. */
export const wordsOf = (cause: unknown): string =>
  cause instanceof RequestError
    ? cause.hint === null
      ? cause.message
      : `${cause.message} ${cause.hint}`
    : 'Something went wrong on this page. Load it again; nothing typed is lost.';
