import type { EntityManager } from 'typeorm';
import { gone } from '../../errors.ts';
import { digestOf } from '../auth/index.ts';
import { InvitationEntity } from './entities/invitation.ts';

/**
 * The invitation of a link, locked while a transaction uses it.
 * @throws gone, saying why it does not work.
 */
export async function openInvitation(
  manager: EntityManager,
  token: string,
  { lock = false }: { readonly lock?: boolean } = {},
): Promise<InvitationEntity> {
  const invitation = await manager.findOne(InvitationEntity, {
    where: { digest: digestOf(token) },
    ...(lock ? { lock: { mode: 'pessimistic_write' } } : {}),
  });
  if (invitation === null) {
    throw gone('This invitation does not exist.', { hint: 'Open the link of the letter once more, whole.' });
  }
  if (invitation.usedAt !== null) {
    throw gone('This invitation has been used already; it works once.', {
      hint: 'If you joined with it, sign in: the group is on your shelf.',
    });
  }
  if (invitation.withdrawnAt !== null) {
    throw gone('This invitation was withdrawn, or a newer one took its place.', {
      hint: 'Look for a newer letter, or ask the person who invited you.',
    });
  }
  if (invitation.until.getTime() < Date.now()) {
    throw gone('This invitation has run out.', { hint: 'Ask the person who invited you for a new one.' });
  }
  return invitation;
}

/** The address an invitation that works was sent to, or null; signing up asks this. */
export async function invitedAddress(manager: EntityManager, token: string): Promise<string | null> {
  return openInvitation(manager, token).then(
    ({ email }) => email,
    () => null,
  );
}
