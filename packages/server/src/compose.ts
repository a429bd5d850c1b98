import type { Config } from './config/index.ts';
import { createDataSource } from './database/data-source.ts';
import { entities } from './entities.ts';
import { createEvents } from './events.ts';
import { createRateLimits } from './http/rate-limit.ts';
import type { Logger } from './logger.ts';
import { createAuth } from './modules/auth/index.ts';
import { createCollaboration } from './modules/collaboration/index.ts';
import { createGroups, type GroupContents, invitedAddress } from './modules/groups/index.ts';
import { createPostman } from './modules/mail/index.ts';
import { createNotebooks, notebooksOfGroup } from './modules/notebooks/index.ts';
import { createOperator, type QueueSource } from './modules/operator/index.ts';
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
  const contents: GroupContents = {
    notebooks: notebooksOfGroup,
    records: async () => [],
  };
  const postman = createPostman(services);
  const auth = createAuth(services, invitedAddress);
  const groups = createGroups(services, contents);
  const notebooks = createNotebooks(services, async () => []);
  const collaboration = createCollaboration(services, { readPerson: auth.readPerson });
  const queue: QueueSource = async () => ({ workers: [], waiting: 0, running: 0, groups: [] });
  const operator = createOperator(services, queue);
  return [postman, auth, groups, notebooks, collaboration, operator];
}
