import type { GroupRole } from '@stillroom/shared/roles';
import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { findPerson } from '../../auth/index.ts';
import { recordAudit } from '../audit.ts';
import { MembershipEntity } from '../entities/membership.ts';
import { reachInWords } from '../reach.ts';
import { keepALead, lockMembers, pickMember } from './members.ts';

interface Change {
  readonly role: GroupRole;
  readonly notebooks: readonly string[] | null;
}

/**
 * Gives a member another role or other notebooks. Takes effect at once, also on open connections.
 * @throws not-found, conflict where the last lead would be one no longer.
 */
export async function changeMember(
  manager: EntityManager,
  by: string,
  group: string,
  person: string,
  change: Change,
): Promise<void> {
  const members = await lockMembers(manager, group);
  const before = pickMember(members, person);
  if (change.role !== 'lead') keepALead(members, person);
  // A lead manages the whole group; limiting one to some notebooks would say otherwise.
  const notebooks = change.role === 'lead' || change.notebooks === null ? null : [...change.notebooks];
  const [was, is] = [reachInWords(before), reachInWords({ role: change.role, notebooks })];
  if (was === is && String(before.notebooks) === String(notebooks)) return;
  await manager.update(MembershipEntity, { group, person }, { role: change.role, notebooks });
  const name = (await findPerson(manager, person))?.name ?? 'someone';
  const words = `changed ${name} from ${was} to ${is}`;
  await recordAudit(manager, { group, by, verb: 'member.changed', words });
  await announce(manager, 'access.changed', { person, group });
}
