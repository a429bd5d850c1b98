import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { recordAudit } from '../../groups/index.ts';
import { ReviewEntity, type ReviewVerdict } from '../entities/review.ts';
import type { OpenedReview } from '../load.ts';
import { shownName } from '../state.ts';

/** Takes a reviewer's verdict: the review has come back, and its link only reads from now on. */
export async function returnReview(
  manager: EntityManager,
  { review, record }: OpenedReview,
  verdict: ReviewVerdict,
): Promise<void> {
  await manager.update(ReviewEntity, { id: review.id }, { verdict, returnedAt: new Date() });
  const words = `${shownName(review)} returned a review of record No. ${record.number}`;
  await recordAudit(manager, { group: record.group, by: null, verb: 'review.returned', words });
  await announce(manager, 'records.changed', { notebook: record.notebook });
}
