import type { TaskList } from 'graphile-worker';
import { describeError } from '../../logger.ts';
import type { ServerModule, Services } from '../../services.ts';
import type { Pool } from '../compute/index.ts';
import { rerunTask, type RerunTask } from './commands/begin-rerun.ts';
import { closeOrphans, runRerun } from './jobs/rerun.ts';
import { reviewsRoutes } from './reviews.routes.ts';

/** How often reruns of processes that are no more are looked for, in milliseconds. */
const sweeping = 30_000;

/** Reviews of records. */
export function createReviews(services: Services): ServerModule {
  const { database, log } = services;
  let timer: NodeJS.Timeout | null = null;
  const sweep = () =>
    closeOrphans(database.manager).catch((error: unknown) =>
      log.warn('Reruns could not be looked through.', describeError(error)),
    );
  return {
    routes: reviewsRoutes(services),
    async start() {
      await sweep();
      timer = setInterval(() => void sweep(), sweeping).unref();
    },
    async stop() {
      if (timer !== null) clearInterval(timer);
    },
  };
}

/** The tasks of this module, for the process that computes. */
export const reviewTasks =
  ({ database }: Services) =>
  (pool: Pool, host: string): TaskList => ({
    [rerunTask]: (payload, { abortSignal }) =>
      runRerun(database.manager, { pool, host, signal: abortSignal }, (payload as RerunTask).rerun),
  });
