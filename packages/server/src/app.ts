import express, { type Express } from 'express';
import helmet from 'helmet';
import { notFound } from './errors.ts';
import { setContentPolicy } from './http/content-policy.ts';
import { errorExit } from './http/error-exit.ts';
import { serveClient } from './http/client.ts';
import { refuseForeignOrigin } from './http/origin.ts';
import type { ServerModule, Services } from './services.ts';

/** The whole application as one request handler: guards first, then the modules in order, then the pages. */
export function createApp(
  services: Services,
  modules: readonly ServerModule[],
  clientFolder: string,
): Express {
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', services.config.TRUSTED_PROXIES);
  app.set('query parser', 'simple');
  app.use(helmet({ contentSecurityPolicy: false, strictTransportSecurity: isSecure(services) }));
  app.use(setContentPolicy());
  app.use('/api', refuseForeignOrigin(services.config), (_request, response, next) => {
    response.set('Cache-Control', 'no-store');
    next();
  });
  for (const { routes } of modules) if (routes !== undefined) app.use(routes);
  app.use('/api', (_request, _response, next) => next(notFound('address')));
  app.use(serveClient(clientFolder));
  app.use((_request, _response, next) => next(notFound('page')));
  app.use(errorExit(services.log));
  return app;
}

const isSecure = ({ config }: Services): boolean => config.PUBLIC_URL?.startsWith('https:') ?? false;
