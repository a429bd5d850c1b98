import { readSettings } from '../modules/auth/index.ts';
import type { SessionView } from '@stillroom/shared/contracts';
import type { Services } from '../services.ts';
import { seedDemo } from './seed.ts';

export interface Demo {
  readonly accounts: SessionView['demo'];
  /** Path of the reviewer's link. */
  readonly review: string | null;
}

/** Seeds the demo where the installation is empty, and says how to get in. */
export async function needDemo(services: Services): Promise<Demo> {
  if (await seedDemo(services)) services.log.info('The demo was seeded.');
  const { demo, demoReview } = await readSettings(services.database.manager);
  return { accounts: demo, review: demoReview };
}
