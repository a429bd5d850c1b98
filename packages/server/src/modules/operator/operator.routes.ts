import { installationPatch } from '@stillroom/shared/contracts';
import { Router } from 'express';
import * as z from 'zod/mini';
import { route } from '../../http/route.ts';
import { uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import { writeSetting } from '../auth/index.ts';
import { readOutbox } from '../mail/index.ts';
import { readHealth } from './health.ts';
import { authorizeOperator } from './operator.policy.ts';
import { listPeople } from './people.ts';
import type { QueueSource } from './queue-source.ts';
import { showLetter } from './show-letter.ts';

const letterParams = z.object({ mail: uuid });

/** The operator's room: a standing on the installation, not in a group. */
export function operatorRoutes(services: Services, readQueue: QueueSource): Router {
  const router = Router();

  router.get(
    '/api/operator/health',
    route(services, {
      limit: 'reading',
      who: 'person',
      async handle({ person, manager }) {
        authorizeOperator(person, 'operator.health');
        return readHealth(manager, services.config, await readQueue(manager));
      },
    }),
  );

  router.get(
    '/api/operator/people',
    route(services, {
      limit: 'reading',
      who: 'person',
      async handle({ person, manager }) {
        authorizeOperator(person, 'operator.people');
        return listPeople(manager);
      },
    }),
  );

  router.get(
    '/api/operator/queue',
    route(services, {
      limit: 'reading',
      who: 'person',
      async handle({ person, manager }) {
        authorizeOperator(person, 'operator.queue');
        return readQueue(manager);
      },
    }),
  );

  router.get(
    '/api/operator/outbox',
    route(services, {
      limit: 'reading',
      who: 'person',
      async handle({ person, manager }) {
        authorizeOperator(person, 'operator.outbox');
        return readOutbox(manager, services.config.MAIL_URL !== undefined);
      },
    }),
  );

  router.post(
    '/api/operator/outbox/:mail/showing',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: letterParams,
      async handle({ person, params, manager }) {
        authorizeOperator(person, 'operator.letters');
        return showLetter(manager, services.config, person.id, params.mail);
      },
    }),
  );

  router.patch(
    '/api/operator/settings',
    route(services, {
      limit: 'writing',
      who: 'person',
      body: installationPatch,
      async handle({ person, body, manager }) {
        authorizeOperator(person, 'operator.settings');
        if (body.signUp !== undefined) await writeSetting(manager, 'signUp', body.signUp);
        return readHealth(manager, services.config, await readQueue(manager));
      },
    }),
  );

  return router;
}
