import type { Config } from './config/index.ts';
import { createDataSource } from './database/data-source.ts';
import { createDemo } from './demo/index.ts';
import { entities } from './entities.ts';
import { createEvents } from './events.ts';
import { createRateLimits } from './http/rate-limit.ts';
import type { Logger } from './logger.ts';
import { createAuth } from './modules/auth/index.ts';
import { type Collaboration, createCollaboration } from './modules/collaboration/index.ts';
import { type Compute, createCompute, readQueue } from './modules/compute/index.ts';
import { createPool } from './modules/compute/pool/index.ts';
import { createGroups, type GroupContents, invitedAddress } from './modules/groups/index.ts';
import { createPostman } from './modules/mail/index.ts';
import { createNotebooks, notebooksOfGroup } from './modules/notebooks/index.ts';
import { createOperator } from './modules/operator/index.ts';
import { createRecords, recordsOfGroup, recordsOfNotebook } from './modules/records/index.ts';
import { createReviews, reviewsOfRecord, reviewTasks } from './modules/reviews/index.ts';
import { createShelf } from './modules/shelf/index.ts';
import type { ServerModule, Services } from './services.ts';

/** Opens the database and makes what every module is given. */
export async function createServices(config: Config, log: Logger): Promise<Services> {
  const { DATABASE_URL: url, DATABASE_POOL: pool, RATE_FACTOR } = config;
  return {
    config,
    log,
    database: await createDataSource({ url, entities, pool }).initialize(),
    events: createEvents(url, log),
    limits: createRateLimits(RATE_FACTOR),
  };
}

/**
 * The modules in the order in which they may call each other; what an earlier one needs of a later one is handed to it
 * here as a function.
 */
export function createModules(services: Services): ServerModule[] {
  const { config } = services;
  const contents: GroupContents = {
    notebooks: notebooksOfGroup,
    records: recordsOfGroup,
  };
  const postman = createPostman(services);
  const auth = createAuth(services, invitedAddress);
  const groups = createGroups(services, contents);
  const notebooks = createNotebooks(services, recordsOfNotebook);
  const compute: Compute = createCompute(services, {
    rooms: () => collaboration.rooms,
    createPool: (size) =>
      createPool({
        size,
        ...(config.WORKER_FOLDER === undefined ? {} : { engineFolder: config.WORKER_FOLDER }),
      }),
    tasks: reviewTasks(services),
  });
  const collaboration: Collaboration = createCollaboration(services, {
    readPerson: auth.readPerson,
    sessionStands: auth.sessionStands,
    opened: compute.opened,
  });
  const records = createRecords(services, compute, reviewsOfRecord);
  const reviews = createReviews(services);
  const shelf = createShelf(services, collaboration.rooms);
  const operator = createOperator(services, (manager) => readQueue(manager, compute.pool));
  const demo = createDemo(services, compute);
  return [postman, auth, groups, notebooks, compute, collaboration, records, reviews, shelf, operator, demo];
}
