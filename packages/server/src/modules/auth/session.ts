import { createHash } from 'node:crypto';
import { ServerResponse, type IncomingMessage } from 'node:http';
import connectPgSimple from 'connect-pg-simple';
import type { Request, RequestHandler, Response } from 'express';
import session from 'express-session';
import pg from 'pg';
import type { Config } from '../../config/index.ts';
import type { Services } from '../../services.ts';

declare module 'express-session' {
  interface SessionData {
    /** Set by passport: id of the person. */
    passport?: { user?: string };
    /** ISO times. */
    begun?: string;
    seen?: string;
    /** What the browser called itself when signing in. */
    browser?: string;
  }
}

const day = 24 * 3600 * 1000;
/** `seen` is written no more often than this. */
const seenEvery = 60_000;

export interface Sessions {
  readonly middleware: RequestHandler;
  /** Reads the session of a request that has no response, such as a WebSocket upgrade. */
  read(request: IncomingMessage): Promise<{ readonly sid: string; readonly data: session.SessionData }>;
  stop(): Promise<void>;
}

/** Sessions in PostgreSQL, over a small pool of their own. */
export function createSessions({ config, log }: Services): Sessions {
  const pool = new pg.Pool({
    connectionString: config.DATABASE_URL,
    max: 4,
    application_name: 'stillroom sessions',
  });
  pool.on('error', (error) => log.warn('A connection for sessions was lost.', { error: error.message }));
  const Store = connectPgSimple(session);
  const store = new Store({
    pool,
    tableName: 'session',
    disableTouch: true,
    errorLog: (...words: unknown[]) => log.warn('Sessions:', { words: words.map(String) }),
  });
  const middleware = session({
    name: 'stillroom',
    secret: config.SESSION_SECRET,
    store,
    resave: false,
    saveUninitialized: false,
    rolling: true,
    proxy: config.TRUSTED_PROXIES > 0,
    cookie: cookieOf(config),
  });
  return {
    middleware: (request, response, next) =>
      middleware(request, response, (error?: unknown) => {
        if (error !== undefined) return next(error);
        noteSeen(pool, config.SESSION_DAYS, request).then(() => next(), next);
      }),
    read: (request) =>
      new Promise((resolve, reject) => {
        const silent = new ServerResponse(request) as Response;
        const heard = request as Request;
        middleware(heard, silent, (error?: unknown) => {
          if (error !== undefined) reject(asError(error));
          else resolve({ sid: heard.sessionID, data: heard.session });
        });
      }),
    async stop() {
      store.close();
      await pool.end();
    },
  };
}

const cookieOf = (config: Config): session.CookieOptions => ({
  httpOnly: true,
  sameSite: 'lax',
  secure: 'auto',
  maxAge: config.SESSION_DAYS * day,
});

/**
 * Writes down that the session was used, and carries its end further. By UPDATE, not through the store: the store
 * would put back a session that was ended while this request was under way.
 */
async function noteSeen(pool: pg.Pool, days: number, request: Request): Promise<void> {
  const { session: current, sessionID } = request;
  const person = current?.passport?.user;
  if (person === undefined) return;
  const last = Date.parse(current.seen ?? '');
  if (!Number.isNaN(last) && Date.now() - last < seenEvery) return;
  await pool.query(
    `with touched as (
       update session set sess = jsonb_set(sess::jsonb, '{seen}', to_jsonb($2::text))::json,
         expire = now() + make_interval(days => $3)
       where sid = $1 returning sid)
     update person set seen_at = now() where id = $4 and exists (select from touched)`,
    [sessionID, new Date().toISOString(), days, person],
  );
}

/** A session's name for its owner's list: tells it from others, opens nothing. */
export const sessionName = (sid: string): string =>
  createHash('sha256').update(sid).digest('base64url').slice(0, 16);

const asError = (error: unknown): Error => (error instanceof Error ? error : new Error(String(error)));
