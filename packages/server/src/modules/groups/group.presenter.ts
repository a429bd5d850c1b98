import type { GroupSummary, GroupView, InvitationView, MemberView } from '@stillroom/shared/contracts';
import { abilitiesOf, may, type Membership } from '@stillroom/shared/roles';
import { type EntityManager, IsNull, MoreThan } from 'typeorm';
import { findPeople, type PersonEntity, presentPerson } from '../auth/index.ts';
import type { GroupContents } from './contents.ts';
import type { GroupEntity } from './entities/group.ts';
import { InvitationEntity } from './entities/invitation.ts';
import { MembershipEntity } from './entities/membership.ts';

const rank: Readonly<Record<Membership['role'], number>> = { lead: 0, author: 1, remarker: 2, reader: 3 };

/** A group as one of its members may see it: notebooks outside the chosen ones, and their records, stay out. */
export async function presentGroup(
  manager: EntityManager,
  contents: GroupContents,
  group: GroupEntity,
  membership: Membership,
): Promise<GroupView> {
  const { id, name, hue } = group;
  const sees = (notebook: string): boolean =>
    membership.notebooks === null || membership.notebooks.includes(notebook);
  // What is in the bin is shown to those who can take it out.
  const restores = may(membership.role, 'notebook.restore');
  const notebooks = await contents.notebooks(manager, id);
  return {
    id,
    name,
    hue,
    role: membership.role,
    abilities: abilitiesOf(membership.role),
    members: await presentMembers(manager, id),
    invitations: may(membership.role, 'group.invite') ? await presentInvitations(manager, id) : [],
    notebooks: notebooks.filter(
      ({ id: notebook, deletedAt }) => sees(notebook) && (deletedAt === null || restores),
    ),
    records: await contents.records(manager, id, membership.notebooks),
  };
}

/** A group as a line of the list. */
export async function summarizeGroup(
  manager: EntityManager,
  contents: GroupContents,
  { id, name, hue }: GroupEntity,
  { role, notebooks: chosen }: Membership,
): Promise<GroupSummary> {
  const notebooks = (await contents.notebooks(manager, id)).filter(
    (notebook) => notebook.deletedAt === null && (chosen === null || chosen.includes(notebook.id)),
  );
  const members = await manager.countBy(MembershipEntity, { group: id });
  return { id, name, hue, role, notebooks: notebooks.length, members };
}

async function presentMembers(manager: EntityManager, group: string): Promise<MemberView[]> {
  const memberships = await manager.findBy(MembershipEntity, { group });
  const people = await findPeople(
    manager,
    memberships.map(({ person }) => person),
  );
  return memberships
    .flatMap((membership) => {
      const person = people.get(membership.person);
      return person === undefined ? [] : [presentMember(membership, person)];
    })
    .sort((a, b) => rank[a.role] - rank[b.role] || a.name.localeCompare(b.name, 'en'));
}

function presentMember({ role, notebooks, since }: MembershipEntity, person: PersonEntity): MemberView {
  return {
    ...presentPerson(person),
    email: person.email,
    role,
    notebooks,
    since: since.toISOString(),
    lastSeen: person.seenAt?.toISOString() ?? null,
  };
}

async function presentInvitations(manager: EntityManager, group: string): Promise<InvitationView[]> {
  const open = { group, usedAt: IsNull(), withdrawnAt: IsNull(), until: MoreThan(new Date()) };
  const invitations = await manager.find(InvitationEntity, { where: open, order: { at: 'DESC' } });
  const people = await findPeople(
    manager,
    invitations.map(({ by }) => by),
  );
  return invitations.map((invitation) => presentInvitation(invitation, people.get(invitation.by)));
}

/** An open invitation, for those who may invite. */
export function presentInvitation(
  { id, email, role, notebooks, by, at, until }: InvitationEntity,
  inviter: Pick<PersonEntity, 'id' | 'name' | 'hue'> = { id: by, name: 'Someone', hue: 0 },
): InvitationView {
  return {
    id,
    email,
    role,
    notebooks,
    by: presentPerson(inviter),
    at: at.toISOString(),
    until: until.toISOString(),
  };
}
