import { freezeRequest, publishRequest } from '@stillroom/shared/contracts';
import type { GroupRole } from '@stillroom/shared/roles';
import { Router } from 'express';
import type { EntityManager } from 'typeorm';
import * as z from 'zod/mini';
import { publicAddress } from '../../config/index.ts';
import { route } from '../../http/route.ts';
import { token, uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import type { Compute } from '../compute/index.ts';
import { loadNotebook } from '../notebooks/index.ts';
import { awaitStanding, freezeNotebook, readFreeze } from './commands/freeze.ts';
import { publishRecord } from './commands/publish-record.ts';
import { sendRecordFile } from './download.ts';
import type { RecordEntity } from './entities/record.ts';
import { loadPublicRecord, loadRecord, publicTokenOf } from './load.ts';
import { presentRecord, type RecordReviews } from './record.presenter.ts';

const notebookParams = z.object({ notebook: uuid });
const recordParams = z.object({ record: uuid });
const publicParams = z.object({ token });

/** Reviews and remarks of a record as a member of this role may see them, supplied by the module that comes after. */
export type ReviewsOf = (
  manager: EntityManager,
  record: RecordEntity,
  role: GroupRole,
) => Promise<RecordReviews>;

/** Freezing notebooks and looking at records. */
export function recordsRoutes(services: Services, compute: Compute, reviewsOf: ReviewsOf): Router {
  const router = Router();
  const linkTo = (open: string | null): string | null =>
    open === null ? null : `${publicAddress(services.config)}/read-record/${open}`;

  router.get(
    '/api/notebooks/:notebook/freeze',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: notebookParams,
      async handle({ person, params, manager }) {
        const { notebook } = await loadNotebook(manager, person.id, params.notebook, 'notebook.freeze');
        return readFreeze(manager, compute, notebook);
      },
    }),
  );

  router.post(
    '/api/notebooks/:notebook/freeze',
    route(services, {
      limit: 'heavy',
      who: 'person',
      params: notebookParams,
      body: freezeRequest,
      status: 201,
      transaction: false,
      async handle({ person, params, body, manager }) {
        await loadNotebook(manager, person.id, params.notebook, 'notebook.freeze');
        const standing = await awaitStanding(compute, params.notebook);
        return services.database.transaction(async (sealing) => {
          // What the person may do is asked anew: waiting takes up to a minute and a half.
          const { notebook } = await loadNotebook(sealing, person.id, params.notebook, 'notebook.freeze');
          const { reasons } = body;
          const frozen = await freezeNotebook(sealing, compute, notebook, standing, person.id, reasons);
          return { id: frozen.id, number: frozen.number };
        });
      },
    }),
  );

  router.get(
    '/api/records/:record',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: recordParams,
      async handle({ person, params, manager }) {
        const { record, role } = await loadRecord(manager, person.id, params.record, 'record.read');
        const came = await reviewsOf(manager, record, role);
        const publicLink = linkTo(await publicTokenOf(manager, record.id));
        return presentRecord(manager, record, role, { ...came, publicLink });
      },
    }),
  );

  router.get(
    '/api/records/:record/file',
    route(services, {
      limit: 'reading',
      who: 'person',
      params: recordParams,
      async handle({ person, params, manager, response }) {
        const { record } = await loadRecord(manager, person.id, params.record, 'record.export');
        await sendRecordFile(manager, response, record);
      },
    }),
  );

  router.put(
    '/api/records/:record/public',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: recordParams,
      body: publishRequest,
      async handle({ person, params, body, manager }) {
        const { record } = await loadRecord(manager, person.id, params.record, 'notebook.publish');
        return { publicLink: linkTo(await publishRecord(manager, person.id, record, body.public)) };
      },
    }),
  );

  router.get(
    '/api/public-records/:token',
    route(services, {
      limit: 'reading',
      who: 'anyone',
      params: publicParams,
      async handle({ params, manager }) {
        return presentRecord(manager, await loadPublicRecord(manager, params.token), 'public');
      },
    }),
  );

  router.get(
    '/api/public-records/:token/file',
    route(services, {
      limit: 'reading',
      who: 'anyone',
      params: publicParams,
      async handle({ params, manager, response }) {
        await sendRecordFile(manager, response, await loadPublicRecord(manager, params.token));
      },
    }),
  );

  return router;
}
