import * as z from 'zod/mini';
import { type Ability, type GroupRole, groupRoles } from '../roles/index.ts';
import { email } from './account.ts';

export const title = z.string().check(z.trim(), z.minLength(1, 'A title is needed.'), z.maxLength(200));
export const groupRole = z.enum(groupRoles);
const notebookChoice = z.nullable(z.array(z.uuid()));

export const groupRequest = z.object({ name: title });
export const memberPatch = z.object({ role: groupRole, notebooks: notebookChoice });
export const invitationRequest = z.object({
  email,
  role: groupRole,
  notebooks: notebookChoice,
  message: z.string().check(z.maxLength(2000)),
});
export const handOverRequest = z.object({ to: z.uuid() });

export interface Person {
  readonly id: string;
  readonly name: string;
  readonly initials: string;
  readonly hue: number;
}

export interface GroupSummary {
  readonly id: string;
  readonly name: string;
  readonly role: GroupRole;
  /** 0..5: ground of the spine. */
  readonly hue: number;
  readonly notebooks: number;
  readonly members: number;
}

export interface MemberView extends Person {
  readonly email: string;
  readonly role: GroupRole;
  readonly notebooks: readonly string[] | null;
  readonly since: string;
  readonly lastSeen: string | null;
}

export interface InvitationView {
  readonly id: string;
  readonly email: string;
  readonly role: GroupRole;
  readonly notebooks: readonly string[] | null;
  readonly by: Person;
  readonly at: string;
  readonly until: string;
}

/** GET /api/groups/:group */
export interface GroupView {
  readonly id: string;
  readonly name: string;
  readonly hue: number;
  readonly role: GroupRole;
  readonly abilities: readonly Ability[];
  readonly members: readonly MemberView[];
  readonly invitations: readonly InvitationView[];
  readonly notebooks: readonly {
    readonly id: string;
    readonly title: string;
    readonly deletedAt: string | null;
  }[];
  readonly records: readonly {
    readonly id: string;
    readonly number: number;
    readonly title: string;
    readonly at: string;
  }[];
}

/** One line of the audit trail, newest first; `words` is a whole sentence without the person. */
export interface AuditEntry {
  readonly id: string;
  readonly at: string;
  readonly by: Person | null;
  readonly verb: string;
  readonly words: string;
}

/** GET /api/groups/:group/audit?before=ID */
export interface AuditPage {
  readonly entries: readonly AuditEntry[];
  readonly more: boolean;
}

/** GET /api/invitations/:token (no session needed) */
export interface InvitationCard {
  readonly group: string;
  readonly role: GroupRole;
  readonly email: string;
  readonly by: string;
  readonly message: string;
  readonly until: string;
  /** Whether an account with that address exists already. */
  readonly known: boolean;
}
