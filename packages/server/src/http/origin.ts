import type { IncomingMessage } from 'node:http';
import type { RequestHandler } from 'express';
import type { Config } from '../config/index.ts';
import { forbidden } from '../errors.ts';

/**
 * Whether a request was sent by a page of this installation: its Origin is the public address or, where none is set,
 * the host that was asked. Also for WebSocket upgrades, which no content policy of another page forbids.
 */
export function isSameOrigin(request: IncomingMessage, config: Config): boolean {
  const { origin, host } = request.headers;
  if (origin === undefined) return request.headers['sec-fetch-site'] === 'same-origin';
  if (!URL.canParse(origin)) return false;
  const { host: from, origin: whole } = new URL(origin);
  return config.PUBLIC_URL === undefined ? from === host : whole === new URL(config.PUBLIC_URL).origin;
}

const harmless = new Set(['GET', 'HEAD', 'OPTIONS']);

/** Refuses every changing request that another site's page (or no page at all) sent with our cookie. */
export function refuseForeignOrigin(config: Config): RequestHandler {
  return (request, _response, next) => {
    if (harmless.has(request.method) || isSameOrigin(request, config)) return next();
    next(
      forbidden('This request did not come from a page of this installation.', {
        hint: 'Reload the page. From a program, send the Origin header of this address.',
      }),
    );
  };
}
