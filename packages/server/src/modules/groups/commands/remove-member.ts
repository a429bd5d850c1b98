import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { findPerson } from '../../auth/index.ts';
import { recordAudit } from '../audit.ts';
import { MembershipEntity } from '../entities/membership.ts';
import { keepALead, lockMembers, pickMember } from './members.ts';

/**
 * Takes a member out of a group, or lets one leave. Takes effect at once, also on open connections.
 * @throws not-found, conflict where the last lead would go.
 */
export async function removeMember(
  manager: EntityManager,
  by: string,
  group: string,
  person: string,
): Promise<void> {
  const members = await lockMembers(manager, group);
  const member = pickMember(members, person);
  if (member.role === 'lead') keepALead(members, person);
  await manager.delete(MembershipEntity, { group, person });
  const name = (await findPerson(manager, person))?.name ?? 'someone';
  await recordAudit(
    manager,
    by === person
      ? { group, by, verb: 'member.left', words: 'left the group' }
      : { group, by, verb: 'member.removed', words: `removed ${name}` },
  );
  await announce(manager, 'access.changed', { person, group });
}
