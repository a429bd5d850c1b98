import type { EntityManager } from 'typeorm';
import { recordAudit } from '../audit.ts';
import { GroupEntity } from '../entities/group.ts';
import { MembershipEntity } from '../entities/membership.ts';

/** Opens a group with the person as its first lead. */
export async function createGroup(
  manager: EntityManager,
  person: string,
  name: string,
): Promise<GroupEntity> {
  const hue = (await manager.count(GroupEntity)) % 6;
  const group = await manager.save(manager.create(GroupEntity, { name, hue }));
  await manager.insert(MembershipEntity, { person, group: group.id, role: 'lead', notebooks: null });
  await recordAudit(manager, {
    group: group.id,
    by: person,
    verb: 'group.created',
    words: `opened the group ${name}`,
  });
  return group;
}
