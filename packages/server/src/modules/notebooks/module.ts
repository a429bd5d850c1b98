import { Router } from 'express';
import { describeError } from '../../logger.ts';
import type { ServerModule, Services } from '../../services.ts';
import { emptyBin } from './commands/bin.ts';
import { filesRoutes } from './files.routes.ts';
import type { RecordsOf } from './notebook.presenter.ts';
import { notebooksRoutes } from './notebooks.routes.ts';
import { remarksRoutes } from './remarks.routes.ts';

/** How often the bin is looked through, in milliseconds. */
const binEvery = 3_600_000;

/** Notebooks beside their live documents: files, pictures, remarks, the bin, the public copy. */
export function createNotebooks(services: Services, recordsOf: RecordsOf): ServerModule {
  const routes = Router();
  routes.use(notebooksRoutes(services, recordsOf), filesRoutes(services), remarksRoutes(services));
  let timer: NodeJS.Timeout | null = null;
  const empty = () =>
    emptyBin(services.database.manager).catch((error: unknown) =>
      services.log.warn('The bin could not be emptied.', describeError(error)),
    );
  return {
    routes,
    async start() {
      await empty();
      timer = setInterval(() => void empty(), binEvery).unref();
    },
    async stop() {
      if (timer !== null) clearInterval(timer);
    },
  };
}
