import { type EntityManager, IsNull } from 'typeorm';
import { notFound } from '../../../errors.ts';
import { recordAudit } from '../audit.ts';
import { InvitationEntity } from '../entities/invitation.ts';

/** Makes an open invitation void. @throws not-found where there is no such open one. */
export async function withdrawInvitation(
  manager: EntityManager,
  by: string,
  group: string,
  id: string,
): Promise<void> {
  const open = { id, group, usedAt: IsNull(), withdrawnAt: IsNull() };
  const invitation = await manager.findOneBy(InvitationEntity, open);
  if (invitation === null) throw notFound('open invitation');
  await manager.update(InvitationEntity, { id }, { withdrawnAt: new Date() });
  const words = `withdrew the invitation of ${invitation.email}`;
  await recordAudit(manager, { group, by, verb: 'invitation.withdrawn', words });
}
