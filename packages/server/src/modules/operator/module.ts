import type { QueueView } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';
import type { ServerModule, Services } from '../../services.ts';
import { operatorRoutes } from './operator.routes.ts';

/** Tells what computes and what waits; the compute module supplies it. */
export type QueueSource = (manager: EntityManager) => Promise<QueueView>;

/** The operator's room: health, people, queue, outbox, settings. */
export function createOperator(services: Services, readQueue: QueueSource): ServerModule {
  return { routes: operatorRoutes(services, readQueue) };
}
