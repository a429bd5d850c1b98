import type { QueueView } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';

/** Tells what computes and what waits; the compute module supplies it. */
export type QueueSource = (manager: EntityManager) => Promise<QueueView>;
