import type { ServerModule, Services } from '../../services.ts';
import { operatorRoutes } from './operator.routes.ts';
import type { QueueSource } from './queue-source.ts';

/** The operator's room: health, people, queue, outbox, settings. */
export function createOperator(services: Services, readQueue: QueueSource): ServerModule {
  return { routes: operatorRoutes(services, readQueue) };
}
