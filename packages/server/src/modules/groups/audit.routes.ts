import { Router } from 'express';
import * as z from 'zod/mini';
import { route } from '../../http/route.ts';
import { uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import { auditAsCsv, readAudit } from './audit.ts';
import { loadGroup } from './membership.ts';

const groupParams = z.object({ group: uuid });
const pageQuery = z.object({ before: z.optional(z.string().check(z.regex(/^\d{1,18}$/u))) });

/** Who did what in a group. */
export function auditRoutes(services: Services): Router {
  const router = Router();

  router.get(
    '/api/groups/:group/audit',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: groupParams,
      query: pageQuery,
      async handle({ person, params, query, manager }) {
        await loadGroup(manager, person.id, params.group, 'group.audit.read');
        return readAudit(manager, params.group, query.before);
      },
    }),
  );

  router.get(
    '/api/groups/:group/audit.csv',
    route(services, {
      limit: 'heavy',
      who: 'person',
      params: groupParams,
      async handle({ person, params, manager, response }) {
        await loadGroup(manager, person.id, params.group, 'group.audit.read');
        const csv = await auditAsCsv(manager, params.group);
        response.attachment('audit.csv').type('text/csv').send(csv);
      },
    }),
  );

  return router;
}
