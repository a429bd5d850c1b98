import type { ReviewSummary } from '@stillroom/shared/contracts';
import type { ReviewEntity } from './entities/review.ts';

/** The moment at which a link stops working: the end of its last day, in UTC. */
export const endOf = ({ until }: Pick<ReviewEntity, 'until'>): Date => new Date(`${until}T23:59:59.999Z`);

/** How a review stands. One that came back stays so, whatever happens to its link. */
export function stateOf(review: ReviewEntity, now = new Date()): ReviewSummary['state'] {
  if (review.returnedAt !== null) return 'returned';
  if (review.withdrawnAt !== null) return 'withdrawn';
  if (endOf(review) < now) return 'expired';
  return review.openedAt === null ? 'invited' : 'opened';
}

/** What the authors call a reviewer: "Reviewer 1" where masked. */
export const shownName = ({ masked, name, email, number }: ReviewEntity): string =>
  masked ? `Reviewer ${number}` : name || email;

/** "1 December 2026". */
export const dayInWords = (date: Date): string =>
  date.toLocaleDateString('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' });
