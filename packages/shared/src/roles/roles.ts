/** Roles in a group, strongest first. A role may be limited to chosen notebooks. */
export const groupRoles = ['lead', 'author', 'remarker', 'reader'] as const;
export type GroupRole = (typeof groupRoles)[number];

/** Everyone who may stand before a door: a member, a reviewer of one record, the operator, or anybody with a public link. */
export type Standing = GroupRole | 'reviewer' | 'operator' | 'public';
