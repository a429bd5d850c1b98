import { type InvitationCard, invitationRequest } from '@stillroom/shared/contracts';
import { Router } from 'express';
import * as z from 'zod/mini';
import { route } from '../../http/route.ts';
import { token, uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import { findPerson, findPersonByEmail } from '../auth/index.ts';
import { invite } from './commands/invite.ts';
import { join } from './commands/join.ts';
import { withdrawInvitation } from './commands/withdraw-invitation.ts';
import type { GroupContents } from './contents.ts';
import { GroupEntity } from './entities/group.ts';
import { presentInvitation, summarizeGroup } from './group.presenter.ts';
import { openInvitation } from './invitations.ts';
import { loadGroup } from './membership.ts';

const groupParams = z.object({ group: uuid });
const invitationParams = z.object({ group: uuid, invitation: uuid });
const linkParams = z.object({ token });

/** Invitations into groups: sent and withdrawn by leads, opened and accepted by whoever has the link. */
export function invitationsRoutes(services: Services, contents: GroupContents): Router {
  const router = Router();

  router.post(
    '/api/groups/:group/invitations',
    route(services, {
      limit: 'letters',
      who: 'person',
      params: groupParams,
      body: invitationRequest,
      status: 201,
      async handle({ person, params, body, manager }) {
        const { group } = await loadGroup(manager, person.id, params.group, 'group.invite');
        const invitation = await invite(services, manager, person, group, body);
        return presentInvitation(invitation, person);
      },
    }),
  );

  router.delete(
    '/api/groups/:group/invitations/:invitation',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: invitationParams,
      async handle({ person, params, manager }) {
        await loadGroup(manager, person.id, params.group, 'group.invite');
        await withdrawInvitation(manager, person.id, params.group, params.invitation);
      },
    }),
  );

  router.get(
    '/api/invitations/:token',
    route(services, {
      limit: 'guesses',
      who: 'anyone',
      params: linkParams,
      async handle({ params, manager }): Promise<InvitationCard> {
        const { email, role, message, until, by, group } = await openInvitation(manager, params.token);
        const host = await manager.findOneBy(GroupEntity, { id: group });
        const inviter = await findPerson(manager, by);
        return {
          group: host?.name ?? '',
          role,
          email,
          by: inviter?.name ?? '',
          message,
          until: until.toISOString(),
          known: (await findPersonByEmail(manager, email)) !== null,
        };
      },
    }),
  );

  router.post(
    '/api/invitations/:token',
    route(services, {
      limit: 'guesses',
      who: 'person',
      params: linkParams,
      async handle({ person, params, manager }) {
        const id = await join(manager, person, params.token);
        const { group, membership } = await loadGroup(manager, person.id, id, 'group.read');
        return summarizeGroup(manager, contents, group, membership);
      },
    }),
  );

  return router;
}
