import type { GroupRole, Standing } from './roles.ts';

/**
 * What can be done, by what it is done to. The one table of the installation: the server reads it for every route and
 * every socket message, the client only to show or hide.
 */
export const abilities = [
  // a group
  'group.read',
  'group.rename',
  'group.members.read',
  'group.members.write',
  'group.invite',
  'group.audit.read',
  'group.handOver',
  'group.leave',
  // a notebook
  'notebook.create',
  'notebook.read',
  'notebook.edit',
  'notebook.run',
  'notebook.remark',
  'notebook.settle',
  'notebook.delete',
  'notebook.restore',
  'notebook.export',
  'notebook.publish',
  'notebook.freeze',
  // a record and its reviews
  'record.read',
  'record.results',
  'record.export',
  'record.invite',
  'record.withdraw',
  'record.reviews.read',
  'review.read',
  'review.rerun',
  'review.remark',
  'review.verdict',
  // the installation
  'operator.health',
  'operator.people',
  'operator.queue',
  'operator.outbox',
  'operator.letters',
  'operator.settings',
] as const;
export type Ability = (typeof abilities)[number];

const reads = [
  'group.read',
  'group.members.read',
  'group.leave',
  'notebook.read',
  'notebook.export',
  'record.read',
  'record.results',
  'record.export',
] as const satisfies readonly Ability[];
const remarks = [...reads, 'notebook.remark'] as const satisfies readonly Ability[];
const writes = [
  ...remarks,
  'notebook.create',
  'notebook.edit',
  'notebook.run',
  'notebook.settle',
  'notebook.freeze',
  'record.reviews.read',
] as const satisfies readonly Ability[];

const table: Readonly<Record<Standing, readonly Ability[]>> = {
  lead: [
    ...writes,
    'group.rename',
    'group.members.write',
    'group.invite',
    'group.audit.read',
    'group.handOver',
    'notebook.delete',
    'notebook.restore',
    'notebook.publish',
    'record.invite',
    'record.withdraw',
  ],
  author: writes,
  remarker: remarks,
  reader: reads,
  reviewer: [
    'review.read',
    'review.rerun',
    'review.remark',
    'review.verdict',
    'record.results',
    'record.export',
  ],
  operator: [
    'operator.health',
    'operator.people',
    'operator.queue',
    'operator.outbox',
    'operator.letters',
    'operator.settings',
  ],
  public: ['notebook.read', 'record.read', 'record.results', 'record.export'],
};

/** Whether someone of this standing may do this. `null` (nobody) may do nothing. */
export function may(standing: Standing | null, ability: Ability): boolean {
  return standing !== null && table[standing].includes(ability);
}

/** Everything someone of this standing may do, in table order, to travel with an entity. */
export function abilitiesOf(standing: Standing | null): readonly Ability[] {
  return standing === null ? [] : abilities.filter((ability) => may(standing, ability));
}

/** A membership as the decision needs it: the role, and the notebooks it is limited to (null: all of the group). */
export interface Membership {
  readonly role: GroupRole;
  readonly notebooks: readonly string[] | null;
}

/** The role that counts at one notebook: none outside the chosen ones. */
export function roleAt(membership: Membership | null, notebook: string): GroupRole | null {
  if (membership === null) return null;
  if (membership.notebooks !== null && !membership.notebooks.includes(notebook)) return null;
  return membership.role;
}
