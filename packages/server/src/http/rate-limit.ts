import type { Request, RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { tooMany } from '../errors.ts';
import { personOf } from './authenticate.ts';

/** How often one person (or one address, where nobody is signed in) may do what, in a window of so many seconds. */
export const rateLimits = {
  /** Looking at things. */
  reading: { most: 1200, seconds: 60 },
  /** Changing things. */
  writing: { most: 240, seconds: 60 },
  /** Trying values, as a slider is drawn along. */
  trying: { most: 900, seconds: 60 },
  /** Starting runs. */
  running: { most: 120, seconds: 60 },
  /** Uploads, imports, freezes: what costs the machine. */
  heavy: { most: 60, seconds: 600 },
  /** Whatever sends a letter. */
  letters: { most: 30, seconds: 3600 },
  /** Passwords and tokens: what could be guessed. Counted by address, whoever is signed in. */
  guesses: { most: 40, seconds: 300 },
} as const;
export type RateLimit = keyof typeof rateLimits;
export type RateLimits = Readonly<Record<RateLimit, RequestHandler>>;

/** One counter for each limit, shared by all routes that name it; every bound is multiplied by `factor`. */
export function createRateLimits(factor: number): RateLimits {
  const names = Object.keys(rateLimits) as RateLimit[];
  return Object.fromEntries(names.map((name) => [name, limiter(name, factor)])) as Record<
    RateLimit,
    RequestHandler
  >;
}

/** Refuses requests beyond the limit with words and a `Retry-After`. */
function limiter(name: RateLimit, factor: number): RequestHandler {
  const { most, seconds } = rateLimits[name];
  return rateLimit({
    windowMs: seconds * 1000,
    limit: Math.max(1, Math.round(most * factor)),
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    identifier: name,
    keyGenerator: (request) => keyOf(request, name),
    handler: (_request, response, next) => {
      const wait = Number(response.getHeader('Retry-After') ?? seconds);
      next(
        tooMany('That was too often in a short time.', { hint: `Wait ${inWords(wait)}, then try again.` }),
      );
    },
  });
}

function keyOf(request: Request, name: RateLimit): string {
  const person = name === 'guesses' ? undefined : personOf(request)?.id;
  return person ?? ipKeyGenerator(request.ip ?? 'unknown');
}

/** "40 seconds", "3 minutes". */
export function inWords(seconds: number): string {
  const [count, unit] = seconds <= 90 ? [Math.ceil(seconds), 'second'] : [Math.ceil(seconds / 60), 'minute'];
  return `${count} ${unit}${count === 1 ? '' : 's'}`;
}
