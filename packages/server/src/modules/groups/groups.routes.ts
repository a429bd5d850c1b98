import { groupRequest, handOverRequest, memberPatch } from '@stillroom/shared/contracts';
import { Router } from 'express';
import { In } from 'typeorm';
import * as z from 'zod/mini';
import { route } from '../../http/route.ts';
import { uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import { changeMember } from './commands/change-member.ts';
import { createGroup } from './commands/create-group.ts';
import { handOver } from './commands/hand-over.ts';
import { removeMember } from './commands/remove-member.ts';
import { renameGroup } from './commands/rename-group.ts';
import type { GroupContents } from './contents.ts';
import { GroupEntity } from './entities/group.ts';
import { presentGroup, summarizeGroup } from './group.presenter.ts';
import { loadGroup, membershipsOf } from './membership.ts';

const groupParams = z.object({ group: uuid });
const memberParams = z.object({ group: uuid, person: uuid });

/** Groups and their members. */
export function groupsRoutes(services: Services, contents: GroupContents): Router {
  const router = Router();

  router.get(
    '/api/groups',
    route(services, {
      limit: 'reading',
      who: 'person',
      async handle({ person, manager }) {
        const memberships = await membershipsOf(manager, person.id);
        const ids = memberships.map(({ group }) => group);
        const groups = await manager.find(GroupEntity, { where: { id: In(ids) }, order: { name: 'ASC' } });
        const lines = [];
        for (const group of groups) {
          const membership = memberships.find((candidate) => candidate.group === group.id);
          if (membership !== undefined)
            lines.push(await summarizeGroup(manager, contents, group, membership));
        }
        return lines;
      },
    }),
  );

  router.post(
    '/api/groups',
    route(services, {
      limit: 'writing',
      who: 'person',
      body: groupRequest,
      status: 201,
      async handle({ person, body, manager }) {
        const group = await createGroup(manager, person.id, body.name);
        return summarizeGroup(manager, contents, group, { role: 'lead', notebooks: null });
      },
    }),
  );

  router.get(
    '/api/groups/:group',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: groupParams,
      async handle({ person, params, manager }) {
        const { group, membership } = await loadGroup(manager, person.id, params.group, 'group.read');
        return presentGroup(manager, contents, group, membership);
      },
    }),
  );

  router.patch(
    '/api/groups/:group',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: groupParams,
      body: groupRequest,
      async handle({ person, params, body, manager }) {
        const { group, membership } = await loadGroup(manager, person.id, params.group, 'group.rename');
        await renameGroup(manager, person.id, group, body.name);
        return presentGroup(manager, contents, { ...group, name: body.name }, membership);
      },
    }),
  );

  router.patch(
    '/api/groups/:group/members/:person',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: memberParams,
      body: memberPatch,
      async handle({ person, params, body, manager }) {
        await loadGroup(manager, person.id, params.group, 'group.members.write');
        await changeMember(manager, person.id, params.group, params.person, body);
        const { group, membership } = await loadGroup(manager, person.id, params.group, 'group.read');
        return presentGroup(manager, contents, group, membership);
      },
    }),
  );

  router.delete(
    '/api/groups/:group/members/:person',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: memberParams,
      async handle({ person, params, manager }) {
        const leaves = params.person === person.id;
        const ability = leaves ? 'group.leave' : 'group.members.write';
        const { group, membership } = await loadGroup(manager, person.id, params.group, ability);
        await removeMember(manager, person.id, params.group, params.person);
        return leaves ? undefined : presentGroup(manager, contents, group, membership);
      },
    }),
  );

  router.post(
    '/api/groups/:group/hand-over',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: groupParams,
      body: handOverRequest,
      async handle({ person, params, body, manager }) {
        await loadGroup(manager, person.id, params.group, 'group.handOver');
        await handOver(manager, person.id, params.group, body.to);
        const { group, membership } = await loadGroup(manager, person.id, params.group, 'group.read');
        return presentGroup(manager, contents, group, membership);
      },
    }),
  );

  return router;
}
