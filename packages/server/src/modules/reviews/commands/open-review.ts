import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { ReviewEntity } from '../entities/review.ts';
import type { OpenedReview } from '../load.ts';

/** Notes that a link was opened, the first time. */
export async function openForReviewer(
  manager: EntityManager,
  { review, record }: OpenedReview,
): Promise<void> {
  if (review.openedAt !== null) return;
  review.openedAt = new Date();
  await manager.update(ReviewEntity, { id: review.id }, { openedAt: review.openedAt });
  await announce(manager, 'records.changed', { notebook: record.notebook });
}
