import type { EntityManager } from 'typeorm';
import { conflict, notFound } from '../../../errors.ts';
import { GroupEntity } from '../entities/group.ts';
import { MembershipEntity } from '../entities/membership.ts';

/**
 * The members of a group, with the group locked: changes of membership happen one after another, so that two leads
 * who leave at once cannot both see the other stay.
 */
export async function lockMembers(manager: EntityManager, group: string): Promise<MembershipEntity[]> {
  await manager.findOne(GroupEntity, { where: { id: group }, lock: { mode: 'pessimistic_write' } });
  return manager.findBy(MembershipEntity, { group });
}

/** @throws not-found */
export function pickMember(members: readonly MembershipEntity[], person: string): MembershipEntity {
  const member = members.find((candidate) => candidate.person === person);
  if (member === undefined) throw notFound('member of the group');
  return member;
}

/** @throws conflict where nobody but this person leads the group. */
export function keepALead(members: readonly MembershipEntity[], person: string): void {
  if (members.some((member) => member.role === 'lead' && member.person !== person)) return;
  throw conflict('A group keeps at least one lead, and this is the last.', {
    hint: 'Make someone else a lead first, or hand the group over.',
  });
}
