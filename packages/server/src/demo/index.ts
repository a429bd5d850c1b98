import { setTimeout as pause } from 'node:timers/promises';
import type { SessionView } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';
import { readSettings } from '../modules/auth/index.ts';
import type { Compute } from '../modules/compute/index.ts';
import type { ServerModule, Services } from '../services.ts';
import { seedReview } from './review.ts';
import { seedDemo } from './seed.ts';

export interface Demo {
  readonly accounts: SessionView['demo'];
  /** Path of the reviewer's link; null before its record is frozen. */
  readonly review: string | null;
}

/** How long the start waits for the record under review; on a slow machine it is frozen later. */
const patience = 90_000;

/** Fills an empty demo installation before the first request. To be started last: it uses everything. */
export function createDemo(services: Services, compute: Compute): ServerModule {
  if (!services.config.DEMO || compute.pool === null) return {};
  const stopping = new AbortController();
  let review: Promise<void> = Promise.resolve();
  return {
    async start() {
      if (await seedDemo(services)) services.log.info('The demo was seeded.');
      review = seedReview(services, compute, stopping.signal);
      await Promise.race([review, pause(patience, undefined, { ref: false })]);
    },
    async stop() {
      stopping.abort();
      await review;
    },
  };
}

/** How to get into a demo installation. */
export async function readDemo(manager: EntityManager): Promise<Demo> {
  const { demo, demoReview } = await readSettings(manager);
  return { accounts: demo, review: demoReview };
}
