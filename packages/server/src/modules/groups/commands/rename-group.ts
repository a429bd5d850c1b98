import type { EntityManager } from 'typeorm';
import { recordAudit } from '../audit.ts';
import { GroupEntity } from '../entities/group.ts';

/** Gives a group another name. */
export async function renameGroup(
  manager: EntityManager,
  person: string,
  group: GroupEntity,
  name: string,
): Promise<void> {
  if (name === group.name) return;
  await manager.update(GroupEntity, group.id, { name });
  await recordAudit(manager, {
    group: group.id,
    by: person,
    verb: 'group.renamed',
    words: `renamed the group from ${group.name} to ${name}`,
  });
}
