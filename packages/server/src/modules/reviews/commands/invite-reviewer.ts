import type { reviewInvitation as reviewInvitationRequest } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';
import type * as z from 'zod/mini';
import { announce } from '../../../events.ts';
import { invalid } from '../../../errors.ts';
import { digestOf, findPerson, newToken } from '../../auth/index.ts';
import { GroupEntity, recordAudit } from '../../groups/index.ts';
import { queueMail, reviewInvitation } from '../../mail/index.ts';
import type { RecordEntity } from '../../records/index.ts';
import { ReviewEntity } from '../entities/review.ts';
import { dayInWords, endOf, shownName } from '../state.ts';

type Invitation = z.infer<typeof reviewInvitationRequest>;

/** Longest time a link may work, in days. */
const longest = 366;

/**
 * Invites somebody to review a record: sends them a link that opens it without a password. The token is in the letter
 * alone and in what this returns, for whoever has to hand it on.
 * @throws invalid where the last day is past or too far off.
 */
export async function inviteReviewer(
  manager: EntityManager,
  address: string,
  by: string,
  record: RecordEntity,
  invitation: Invitation,
): Promise<{ readonly review: ReviewEntity; readonly token: string }> {
  checkUntil(invitation.until);
  const { email, name, masked, until, message } = invitation;
  // Locked, so that two invitations at once get two numbers; the record's own line is sealed and cannot be.
  const group = await manager.findOneOrFail(GroupEntity, {
    where: { id: record.group },
    lock: { mode: 'pessimistic_write' },
  });
  const number = ((await manager.maximum(ReviewEntity, 'number', { record: record.id })) ?? 0) + 1;
  const token = newToken();
  const made = await manager.save(
    manager.create(ReviewEntity, {
      record: record.id,
      number,
      email,
      name,
      masked,
      until,
      digest: digestOf(token),
      invitedBy: by,
    }),
  );
  const review = await manager.findOneByOrFail(ReviewEntity, { id: made.id });
  const letter = reviewInvitation({
    to: email,
    name,
    by: (await findPerson(manager, by))?.name ?? 'Somebody',
    group: group.name,
    record: `record No. ${record.number}, ${record.title}`,
    message,
    until: dayInWords(endOf(review)),
    link: `${address}/review/${token}`,
  });
  await queueMail(manager, letter, {
    group: record.group,
    ...(masked ? { maskedAs: shownName(review) } : {}),
  });
  const words = `invited ${shownName(review)} to review record No. ${record.number}`;
  await recordAudit(manager, { group: record.group, by, verb: 'review.invited', words });
  await announce(manager, 'records.changed', { notebook: record.notebook });
  return { review, token };
}

function checkUntil(until: string): void {
  const end = endOf({ until }).getTime();
  if (end < Date.now()) {
    throw invalid('The last day of the link is past.', { fields: { until: 'Choose a day from today on.' } });
  }
  if (end > Date.now() + longest * 24 * 3600 * 1000) {
    throw invalid('A link works for a year at most.', { fields: { until: 'Choose a day within a year.' } });
  }
}
