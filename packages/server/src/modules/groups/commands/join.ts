import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { conflict } from '../../../errors.ts';
import type { SignedIn } from '../../../http/authenticate.ts';
import { recordAudit } from '../audit.ts';
import { InvitationEntity } from '../entities/invitation.ts';
import { MembershipEntity } from '../entities/membership.ts';
import { openInvitation } from '../invitations.ts';
import { reachInWords } from '../reach.ts';
import { lockMembers } from './members.ts';

/**
 * Joins a group by an invitation, which is then used up. @returns the group's id.
 * @throws gone; conflict where it was sent to another address than that of the person signed in.
 */
export async function join(manager: EntityManager, person: SignedIn, token: string): Promise<string> {
  const invitation = await openInvitation(manager, token, { lock: true });
  const { id, group, email, role, notebooks } = invitation;
  if (email !== person.email) {
    throw conflict(`This invitation was sent to ${email}; you are signed in as ${person.email}.`, {
      hint: `Sign out and sign in (or up) as ${email}, or ask for an invitation to ${person.email}.`,
    });
  }
  const members = await lockMembers(manager, group);
  await manager.update(InvitationEntity, { id }, { usedAt: new Date() });
  if (members.some((member) => member.person === person.id)) return group;
  await manager.insert(MembershipEntity, { person: person.id, group, role, notebooks });
  const words = `joined as ${reachInWords(invitation)}`;
  await recordAudit(manager, { group, by: person.id, verb: 'member.joined', words });
  await announce(manager, 'access.changed', { person: person.id, group });
  return group;
}
