export { groupRoles } from './roles.ts';
export type { GroupRole, Standing } from './roles.ts';
export { abilities, abilitiesOf, may, roleAt } from './abilities.ts';
export type { Ability, Membership } from './abilities.ts';
