import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { conflict, notFound } from '../../../errors.ts';
import { recordAudit } from '../../groups/index.ts';
import type { RecordEntity } from '../../records/index.ts';
import { ReviewEntity } from '../entities/review.ts';
import { shownName } from '../state.ts';

/**
 * Withdraws the link of a review; it opens nothing from now on.
 * @throws not-found; conflict where the review has come back, which stays.
 */
export async function withdrawReview(
  manager: EntityManager,
  by: string,
  record: RecordEntity,
  id: string,
): Promise<void> {
  const review = await manager.findOneBy(ReviewEntity, { id, record: record.id });
  if (review === null) throw notFound('review');
  if (review.returnedAt !== null)
    throw conflict('This review has come back and cannot be withdrawn any more.');
  if (review.withdrawnAt !== null) return;
  await manager.update(ReviewEntity, { id }, { withdrawnAt: new Date() });
  const words = `withdrew the invitation of ${shownName(review)} to review record No. ${record.number}`;
  await recordAudit(manager, { group: record.group, by, verb: 'review.withdrawn', words });
  await announce(manager, 'records.changed', { notebook: record.notebook });
}
