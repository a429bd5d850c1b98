import { answerRequest, remarkRequest, settleRequest } from '@stillroom/shared/contracts';
import { Router } from 'express';
import type { EntityManager } from 'typeorm';
import * as z from 'zod/mini';
import { route } from '../../http/route.ts';
import { uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import { answerRemark, settleRemark, writeRemark } from './commands/remarks.ts';
import { RemarkEntity } from './entities/remark.ts';
import { loadNotebook } from './load.ts';
import { presentRemarks } from './remark.presenter.ts';

const notebookParams = z.object({ notebook: uuid });
const remarkParams = z.object({ notebook: uuid, remark: uuid });

/** Remarks on the cells of a notebook. */
export function remarksRoutes(services: Services): Router {
  const router = Router();
  const presentOne = async (manager: EntityManager, remark: RemarkEntity) =>
    (await presentRemarks(manager, [remark]))[0];

  router.get(
    '/api/notebooks/:notebook/remarks',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: notebookParams,
      async handle({ person, params: { notebook }, manager }) {
        await loadNotebook(manager, person.id, notebook, 'notebook.read');
        return presentRemarks(manager, await remarksOf(manager, notebook));
      },
    }),
  );

  router.post(
    '/api/notebooks/:notebook/remarks',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: notebookParams,
      body: remarkRequest,
      status: 201,
      async handle({ person, params: { notebook }, body, manager }) {
        await loadNotebook(manager, person.id, notebook, 'notebook.remark');
        return presentOne(manager, await writeRemark(manager, notebook, body, { by: person.id }));
      },
    }),
  );

  router.post(
    '/api/notebooks/:notebook/remarks/:remark/answers',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: remarkParams,
      body: answerRequest,
      status: 201,
      async handle({ person, params: { notebook, remark }, body, manager }) {
        await loadNotebook(manager, person.id, notebook, 'notebook.remark');
        return presentOne(manager, await answerRemark(manager, person.id, notebook, remark, body.text));
      },
    }),
  );

  router.patch(
    '/api/notebooks/:notebook/remarks/:remark',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: remarkParams,
      body: settleRequest,
      async handle({ person, params: { notebook, remark }, body, manager }) {
        await loadNotebook(manager, person.id, notebook, 'notebook.settle');
        return presentOne(manager, await settleRemark(manager, person.id, notebook, remark, body.settled));
      },
    }),
  );

  return router;
}

/** All remarks on a notebook, oldest first. */
export const remarksOf = (manager: EntityManager, notebook: string): Promise<RemarkEntity[]> =>
  manager.find(RemarkEntity, { where: { notebook }, order: { at: 'ASC' } });
