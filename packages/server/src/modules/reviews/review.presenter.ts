import type { RerunView, ReviewSummary, ReviewView } from '@stillroom/shared/contracts';
import { type GroupRole, may } from '@stillroom/shared/roles';
import type { EntityManager } from 'typeorm';
import { findPerson, presentPerson } from '../auth/index.ts';
import { presentRemarks, RemarkEntity } from '../notebooks/index.ts';
import { presentRecord, type RecordEntity, type RecordReviews } from '../records/index.ts';
import { RerunCellEntity, RerunEntity } from './entities/rerun.ts';
import { ReviewEntity } from './entities/review.ts';
import type { OpenedReview } from './load.ts';
import { shownName, stateOf } from './state.ts';

/** A review as the authors' side sees it. Who invites knows the address; of a masked reviewer nobody else does. */
export function presentSummary(review: ReviewEntity, role: GroupRole): ReviewSummary {
  const { verdict, returnedAt, masked } = review;
  return {
    id: review.id,
    name: shownName(review),
    masked,
    email: !masked || may(role, 'record.invite') ? review.email : null,
    until: review.until,
    state: stateOf(review),
    invitedAt: review.invitedAt.toISOString(),
    verdict:
      verdict === null || returnedAt === null
        ? null
        : {
            recommendation: verdict.recommendation,
            toAuthors: verdict.toAuthors,
            at: returnedAt.toISOString(),
          },
  };
}

/** Reviews of a record and the remarks that came with them, for members who may read them. */
export async function reviewsOfRecord(
  manager: EntityManager,
  record: RecordEntity,
  role: GroupRole,
): Promise<RecordReviews> {
  if (!may(role, 'record.reviews.read')) return { reviews: [], remarks: [] };
  const reviews = await manager.find(ReviewEntity, {
    where: { record: record.id },
    order: { number: 'ASC' },
  });
  const remarks = await manager.find(RemarkEntity, { where: { record: record.id }, order: { at: 'ASC' } });
  return {
    reviews: reviews.map((review) => presentSummary(review, role)),
    remarks: await presentRemarks(manager, remarks),
  };
}

/** Everything a reviewer's link opens. */
export async function presentReview(
  manager: EntityManager,
  { review, record }: OpenedReview,
): Promise<ReviewView> {
  const remarks = await manager.find(RemarkEntity, { where: { review: review.id }, order: { at: 'ASC' } });
  const rerun = await manager.findOne(RerunEntity, { where: { review: review.id }, order: { at: 'DESC' } });
  const inviter = await findPerson(manager, review.invitedBy);
  return {
    record: await presentRecord(manager, record, 'reviewer'),
    you: { name: shownName(review), masked: review.masked, until: review.until },
    remarks: await presentRemarks(manager, remarks),
    rerun: rerun === null ? null : await presentRerun(manager, rerun),
    verdict: review.verdict,
    by: presentPerson(inviter ?? { id: review.invitedBy, name: 'Somebody', hue: 0 }),
  };
}

/** A rerun as far as it is. */
export async function presentRerun(manager: EntityManager, rerun: RerunEntity): Promise<RerunView> {
  const cells = await manager.findBy(RerunCellEntity, { rerun: rerun.id });
  return {
    id: rerun.id,
    at: rerun.at.toISOString(),
    done: rerun.doneAt !== null,
    engine: rerun.engine,
    cells: Object.fromEntries(
      cells.map(({ cell, outcome, why, result }) => [
        cell,
        {
          outcome,
          ...(why === null ? {} : { why }),
          ...(result === null ? {} : { result: JSON.parse(result) as unknown }),
        },
      ]),
    ),
  };
}
