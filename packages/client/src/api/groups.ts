import type {
  AuditPage,
  GroupSummary,
  GroupView,
  InvitationCard,
  InvitationView,
} from '@stillroom/shared/contracts';
import type { GroupRole } from '@stillroom/shared/roles';
import { request } from './client.ts';

export const fetchGroups = () => request<GroupSummary[]>('GET', '/api/groups');
export const createGroup = (name: string) => request<GroupSummary>('POST', '/api/groups', { name });
export const fetchGroup = (group: string) => request<GroupView>('GET', `/api/groups/${group}`);
export const renameGroup = (group: string, name: string) =>
  request<GroupView>('PATCH', `/api/groups/${group}`, { name });
export const changeMember = (
  group: string,
  person: string,
  patch: { role: GroupRole; notebooks: readonly string[] | null },
) => request<GroupView>('PATCH', `/api/groups/${group}/members/${person}`, patch);
export const removeMember = (group: string, person: string) =>
  request<GroupView | undefined>('DELETE', `/api/groups/${group}/members/${person}`);
export const invite = (
  group: string,
  form: { email: string; role: GroupRole; notebooks: readonly string[] | null; message: string },
) => request<InvitationView>('POST', `/api/groups/${group}/invitations`, form);
export const withdrawInvitation = (group: string, invitation: string) =>
  request<void>('DELETE', `/api/groups/${group}/invitations/${invitation}`);
export const handOver = (group: string, to: string) =>
  request<GroupView>('POST', `/api/groups/${group}/hand-over`, { to });
export const fetchAudit = (group: string, before?: string) =>
  request<AuditPage>('GET', `/api/groups/${group}/audit${before === undefined ? '' : `?before=${before}`}`);
export const fetchInvitation = (token: string) => request<InvitationCard>('GET', `/api/invitations/${token}`);
export const acceptInvitation = (token: string) => request<GroupSummary>('POST', `/api/invitations/${token}`);
