import { Router } from 'express';
import type { ServerModule, Services } from '../../services.ts';
import { auditRoutes } from './audit.routes.ts';
import type { GroupContents } from './contents.ts';
import { groupsRoutes } from './groups.routes.ts';
import { invitationsRoutes } from './invitations.routes.ts';

/** Groups, members, invitations and the audit trail. */
export function createGroups(services: Services, contents: GroupContents): ServerModule {
  const routes = Router();
  routes.use(groupsRoutes(services, contents), invitationsRoutes(services, contents), auditRoutes(services));
  return { routes };
}
