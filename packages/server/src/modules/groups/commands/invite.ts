import type { GroupRole } from '@stillroom/shared/roles';
import { type EntityManager, IsNull } from 'typeorm';
import { publicAddress } from '../../../config/index.ts';
import { conflict } from '../../../errors.ts';
import type { SignedIn } from '../../../http/authenticate.ts';
import type { Services } from '../../../services.ts';
import { digestOf, findPersonByEmail, newToken } from '../../auth/index.ts';
import { groupInvitation, queueMail } from '../../mail/index.ts';
import { recordAudit } from '../audit.ts';
import type { GroupEntity } from '../entities/group.ts';
import { InvitationEntity } from '../entities/invitation.ts';
import { membershipOf } from '../membership.ts';
import { reachInWords } from '../reach.ts';

const goodForDays = 7;

interface Asked {
  readonly email: string;
  readonly role: GroupRole;
  readonly notebooks: readonly string[] | null;
  readonly message: string;
}

/**
 * Invites an address into a group by letter. An earlier invitation of the same address stops working.
 * @throws conflict where the person is a member already.
 */
export async function invite(
  { config }: Services,
  manager: EntityManager,
  by: SignedIn,
  group: GroupEntity,
  asked: Asked,
): Promise<InvitationEntity> {
  const { email, role, message } = asked;
  const known = await findPersonByEmail(manager, email);
  if (known !== null && (await membershipOf(manager, known.id, group.id)) !== null) {
    throw conflict(`${known.name} is a member of the group already.`, {
      hint: 'Change the role in the list of members.',
    });
  }
  const notebooks = role === 'lead' || asked.notebooks === null ? null : [...asked.notebooks];
  const open = { group: group.id, email, usedAt: IsNull(), withdrawnAt: IsNull() };
  await manager.update(InvitationEntity, open, { withdrawnAt: new Date() });
  const token = newToken();
  const until = new Date(Date.now() + goodForDays * 24 * 3_600_000);
  const fields = {
    digest: digestOf(token),
    group: group.id,
    email,
    role,
    notebooks,
    message,
    by: by.id,
    until,
  };
  const invitation = await manager.save(manager.create(InvitationEntity, fields));
  const reach = reachInWords({ role, notebooks });
  await queueMail(
    manager,
    groupInvitation({
      to: email,
      by: by.name,
      group: group.name,
      role: reach,
      message,
      until: inWords(until),
      link: `${publicAddress(config)}/invitation/${token}`,
    }),
    { group: group.id },
  );
  const words = `invited ${email} as ${reach}`;
  await recordAudit(manager, { group: group.id, by: by.id, verb: 'member.invited', words });
  return invitation;
}

const inWords = (date: Date): string =>
  date.toLocaleDateString('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' });
