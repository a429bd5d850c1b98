import { randomBytes } from 'node:crypto';
import type { RequestHandler } from 'express';

/**
 * The content policy of every page. Styles need the nonce of the very answer; WebAssembly is the engine in the page's
 * worker. Written by hand: a ready-made default would allow inline styles.
 */
export function contentPolicy(nonce: string): string {
  return [
    `default-src 'none'`,
    `script-src 'self' 'wasm-unsafe-eval'`,
    `style-src 'self' 'nonce-${nonce}'`,
    `img-src 'self' data:`,
    `font-src 'self'`,
    `connect-src 'self'`,
    `worker-src 'self'`,
    `base-uri 'none'`,
    `form-action 'self'`,
    `frame-ancestors 'none'`,
  ].join('; ');
}

/** Sets the policy on every answer; the nonce is at `response.locals.nonce` for the one that renders a page. */
export function setContentPolicy(): RequestHandler {
  return (_request, response, next) => {
    const nonce = randomBytes(16).toString('base64');
    response.locals['nonce'] = nonce;
    response.set('Content-Security-Policy', contentPolicy(nonce));
    next();
  };
}
