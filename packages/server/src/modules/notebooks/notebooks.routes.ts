import { notebookRequest, publishRequest } from '@stillroom/shared/contracts';
import { Router } from 'express';
import * as z from 'zod/mini';
import { route } from '../../http/route.ts';
import { uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import { loadGroup } from '../groups/index.ts';
import { deleteNotebook, restoreNotebook } from './commands/bin.ts';
import { createNotebook } from './commands/create-notebook.ts';
import { publishNotebook } from './commands/publish.ts';
import { loadNotebook } from './load.ts';
import { presentNotebook, type RecordsOf } from './notebook.presenter.ts';

const groupParams = z.object({ group: uuid });
const notebookParams = z.object({ notebook: uuid });

/** Making notebooks, looking at them, the bin, the public copy. */
export function notebooksRoutes(services: Services, recordsOf: RecordsOf): Router {
  const router = Router();

  router.post(
    '/api/groups/:group/notebooks',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: groupParams,
      body: notebookRequest,
      status: 201,
      async handle({ person, params, body, manager }) {
        const { group } = await loadGroup(manager, person.id, params.group, 'notebook.create');
        const content = { title: body.title, subject: 'none' as const, cells: [] };
        const { id } = await createNotebook(manager, { group: group.id, by: person.id, content });
        return { id };
      },
    }),
  );

  router.get(
    '/api/notebooks/:notebook',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: notebookParams,
      async handle({ person, params, manager }) {
        const loaded = await loadNotebook(manager, person.id, params.notebook, 'notebook.read');
        return presentNotebook(manager, services.config, recordsOf, loaded);
      },
    }),
  );

  router.delete(
    '/api/notebooks/:notebook',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: notebookParams,
      async handle({ person, params, manager }) {
        const { notebook } = await loadNotebook(manager, person.id, params.notebook, 'notebook.delete');
        await deleteNotebook(manager, person.id, notebook);
      },
    }),
  );

  router.post(
    '/api/notebooks/:notebook/restore',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: notebookParams,
      async handle({ person, params, manager }) {
        const { notebook } = await loadNotebook(manager, person.id, params.notebook, 'notebook.restore');
        await restoreNotebook(manager, person.id, notebook);
      },
    }),
  );

  router.put(
    '/api/notebooks/:notebook/public',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: notebookParams,
      body: publishRequest,
      async handle({ person, params, body, manager }) {
        const loaded = await loadNotebook(manager, person.id, params.notebook, 'notebook.publish');
        const notebook = await publishNotebook(manager, person.id, loaded.notebook, body.public);
        return presentNotebook(manager, services.config, recordsOf, { ...loaded, notebook });
      },
    }),
  );

  return router;
}
