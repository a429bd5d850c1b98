import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { conflict } from '../../../errors.ts';
import { findPerson } from '../../auth/index.ts';
import { recordAudit } from '../audit.ts';
import { MembershipEntity } from '../entities/membership.ts';
import { lockMembers, pickMember } from './members.ts';

/**
 * Makes another member lead in one's own place; the former lead stays as an author.
 * @throws not-found, conflict where one hands over to oneself.
 */
export async function handOver(manager: EntityManager, by: string, group: string, to: string): Promise<void> {
  if (by === to) throw conflict('The group is in your hands already.', { hint: 'Choose another member.' });
  const members = await lockMembers(manager, group);
  pickMember(members, to);
  await manager.update(MembershipEntity, { group, person: to }, { role: 'lead', notebooks: null });
  await manager.update(MembershipEntity, { group, person: by }, { role: 'author', notebooks: null });
  const name = (await findPerson(manager, to))?.name ?? 'someone';
  await recordAudit(manager, {
    group,
    by,
    verb: 'group.handed-over',
    words: `handed the group over to ${name} and stays as an author`,
  });
  await announce(manager, 'access.changed', { person: to, group });
  await announce(manager, 'access.changed', { person: by, group });
}
