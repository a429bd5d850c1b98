import type { ServerModule, Services } from '../../services.ts';
import type { Compute } from '../compute/index.ts';
import { recordsRoutes, type ReviewsOf } from './records.routes.ts';

/** Freezing notebooks, and the records that come of it. */
export function createRecords(services: Services, compute: Compute, reviewsOf: ReviewsOf): ServerModule {
  return { routes: recordsRoutes(services, compute, reviewsOf) };
}
