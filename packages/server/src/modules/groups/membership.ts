import { type Ability, type GroupRole, may, type Membership, roleAt } from '@stillroom/shared/roles';
import type { EntityManager } from 'typeorm';
import { forbidden, notFound } from '../../errors.ts';
import { GroupEntity } from './entities/group.ts';
import { MembershipEntity } from './entities/membership.ts';

/** What a person is in a group, read now; null where they are not in it. */
export function membershipOf(
  manager: EntityManager,
  person: string,
  group: string,
): Promise<MembershipEntity | null> {
  return manager.findOneBy(MembershipEntity, { person, group });
}

/** All memberships of a person. */
export function membershipsOf(manager: EntityManager, person: string): Promise<MembershipEntity[]> {
  return manager.findBy(MembershipEntity, { person });
}

/** The role that counts at one notebook of a group, read now; null outside it. */
export async function roleAtNotebook(
  manager: EntityManager,
  person: string,
  group: string,
  notebook: string,
): Promise<GroupRole | null> {
  return roleAt(await membershipOf(manager, person, group), notebook);
}

/**
 * Refuses what the role table does not allow. Whoever may not even know of the thing is told that it is not there.
 * @throws not-found without a role, forbidden with one that does not suffice.
 */
export function authorize(role: GroupRole | null, ability: Ability, what: string): asserts role is GroupRole {
  if (role === null) throw notFound(what);
  if (!may(role, ability)) {
    throw forbidden(`As ${withArticle(role)} of the group you may not do that.`, {
      hint: 'A lead of the group can give you another role.',
    });
  }
}

/** "an author", "a lead". */
export const withArticle = (role: GroupRole): string => `${role === 'author' ? 'an' : 'a'} ${role}`;

/**
 * The group and the person's membership, when they may do this there.
 * @throws not-found, forbidden
 */
export async function loadGroup(
  manager: EntityManager,
  person: string,
  id: string,
  ability: Ability,
): Promise<{ readonly group: GroupEntity; readonly membership: Membership }> {
  const membership = await membershipOf(manager, person, id);
  authorize(membership?.role ?? null, ability, 'group');
  const group = await manager.findOneBy(GroupEntity, { id });
  if (group === null || membership === null) throw notFound('group');
  // Who made a notebook outside the chosen ones could not open it.
  if (ability === 'notebook.create' && membership.notebooks !== null) {
    throw forbidden('Your role counts at chosen notebooks of the group only; you may not begin new ones.', {
      hint: 'Ask a lead of the group to begin it, or to let your role count in the whole group.',
    });
  }
  return { group, membership };
}
