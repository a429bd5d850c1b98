import type { EntityManager } from 'typeorm';
import { gone } from '../../errors.ts';
import { digestOf } from '../auth/index.ts';
import { RecordEntity } from '../records/index.ts';
import { ReviewEntity } from './entities/review.ts';
import { dayInWords, endOf } from './state.ts';

export interface OpenedReview {
  readonly review: ReviewEntity;
  readonly record: RecordEntity;
}

/**
 * The review that a link opens, and its record. Each way in which a link can have ended has its own words.
 * @throws gone
 */
export async function openReview(manager: EntityManager, token: string): Promise<OpenedReview> {
  const review = await manager.findOneBy(ReviewEntity, { digest: digestOf(token) });
  if (review === null) {
    throw gone('This link does not open a review.', {
      hint: 'Check that the whole address was copied, or ask for a new invitation.',
    });
  }
  if (review.withdrawnAt !== null) {
    throw gone(`This invitation was withdrawn on ${dayInWords(review.withdrawnAt)}.`, {
      hint: 'Nothing is asked of you any more; write to whoever invited you if that is a mistake.',
    });
  }
  if (endOf(review) < new Date()) {
    throw gone(`This link worked until ${dayInWords(endOf(review))}.`, {
      hint: 'Ask whoever invited you for more time: they can send a new link.',
    });
  }
  const record = await manager.findOneByOrFail(RecordEntity, { id: review.record });
  return { review, record };
}

/**
 * The same, while the reviewer may still do something.
 * @throws gone, also where the verdict has been sent.
 */
export async function openUnreturnedReview(manager: EntityManager, token: string): Promise<OpenedReview> {
  const opened = await openReview(manager, token);
  const { returnedAt } = opened.review;
  if (returnedAt !== null) {
    throw gone(`You sent your verdict on ${dayInWords(returnedAt)}; this link has been used.`, {
      hint: 'The record stays open to read until the link ends. For a second look, ask for a new invitation.',
    });
  }
  return opened;
}
