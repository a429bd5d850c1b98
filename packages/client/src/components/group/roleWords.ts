import type { GroupRole } from '@stillroom/shared/roles';

/** What each role does, in a few words beside its name. */
export const roleWords: Readonly<Record<GroupRole, string>> = {
  lead: 'all that authors do, and manages members',
  author: 'writes cells and prose, runs, freezes',
  remarker: 'reads, and writes in the margin',
  reader: 'reads notebooks and records',
};

/** A role as it stands in a table or a choice. */
export const roleName = (role: GroupRole): string => role.charAt(0).toUpperCase() + role.slice(1);
