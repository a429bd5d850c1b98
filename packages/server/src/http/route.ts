import { limits } from '@stillroom/shared/protocol';
import { json, type Request, type RequestHandler, type Response } from 'express';
import type { EntityManager } from 'typeorm';
import type * as z from 'zod/mini';
import type { Services } from '../services.ts';
import { authenticate, type SignedIn, type Who } from './authenticate.ts';
import type { RateLimit } from './rate-limit.ts';
import { inTransaction } from './transaction.ts';
import { type Schema, validate } from './validate.ts';

const usualBody = 1024 * 1024;

type Output<S> = S extends Schema ? z.output<S> : undefined;

interface Context<W extends Who, P, Q, B> {
  readonly person: W extends 'anyone' ? SignedIn | null : SignedIn;
  readonly params: Output<P>;
  readonly query: Output<Q>;
  readonly body: Output<B>;
  /** Of this request's transaction, where it changes anything and has one. */
  readonly manager: EntityManager;
  readonly request: Request;
  readonly response: Response;
}

interface Sentence<W extends Who, P, Q, B> {
  readonly limit: RateLimit;
  readonly who: W;
  readonly params?: P;
  readonly query?: Q;
  readonly body?: B;
  /**
   * Most bytes of a JSON body, where the usual bound will not do: a megabyte of somebody who is signed in, far less of
   * anybody else.
   */
  readonly most?: number;
  /** Status of a good answer; 204 follows by itself where nothing is answered. */
  readonly status?: 200 | 201 | 202;
  /**
   * Of a changing request whose handler waits, or asks the database by other ways than its manager: no transaction is
   * held open meanwhile. Requests that each hold one connection and wait for another could starve each other.
   */
  readonly transaction?: false;
  /** Load, authorize, command, present. What it returns is the answer. */
  handle(context: Context<W, P, Q, B>): Promise<unknown>;
}

/**
 * Every route is this sentence: limit, authenticate, validate, transaction, then load, authorize, command, present.
 * A handler that has answered by itself (a download) returns nothing.
 */
export function route<
  W extends Who,
  P extends Schema | undefined = undefined,
  Q extends Schema | undefined = undefined,
  B extends Schema | undefined = undefined,
>(services: Services, sentence: Sentence<W, P, Q, B>): RequestHandler[] {
  const known = json({ limit: sentence.most ?? usualBody });
  const stranger = json({ limit: sentence.most ?? limits.strangersBody });
  // Nothing is read of somebody who may not come here at all, and little of somebody who is not known.
  const readBody: RequestHandler = (request, response, next) => {
    const reader = authenticate(request, sentence.who) === null ? stranger : known;
    reader(request, response, next);
  };
  const answer: RequestHandler = async (request, response) => {
    const person = authenticate(request, sentence.who) as Context<W, P, Q, B>['person'];
    const params = read(sentence.params, request.params) as Output<P>;
    const query = read(sentence.query, request.query) as Output<Q>;
    const body = read(sentence.body, request.body) as Output<B>;
    const handle = (manager: EntityManager) =>
      sentence.handle({ person, params, query, body, manager, request, response });
    const result =
      sentence.transaction === false
        ? await handle(services.database.manager)
        : await inTransaction(services.database, request, handle);
    if (response.headersSent) return;
    // A handler whose answers differ in status has set it by itself.
    const chosen = response.statusCode === 200 ? sentence.status : response.statusCode;
    if (result === undefined) response.status(chosen ?? 204).end();
    else response.status(chosen ?? 200).json(result);
  };
  return [services.limits[sentence.limit], readBody, answer];
}

const read = (schema: Schema | undefined, value: unknown): unknown =>
  schema === undefined ? undefined : validate(schema, value);
