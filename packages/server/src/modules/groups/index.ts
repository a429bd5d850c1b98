import { AuditEntity } from './entities/audit.ts';
import { GroupEntity } from './entities/group.ts';
import { InvitationEntity } from './entities/invitation.ts';
import { MembershipEntity } from './entities/membership.ts';

export { recordAudit } from './audit.ts';
export type { AuditVerb } from './audit.ts';
export { createGroup } from './commands/create-group.ts';
export type { GroupContents } from './contents.ts';
export { GroupEntity } from './entities/group.ts';
export { MembershipEntity } from './entities/membership.ts';
export { invitedAddress } from './invitations.ts';
export { authorize, loadGroup, membershipOf, membershipsOf, roleAtNotebook } from './membership.ts';
export { createGroups } from './module.ts';
export const groupEntities = [GroupEntity, MembershipEntity, InvitationEntity, AuditEntity];
