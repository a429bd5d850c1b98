import { type AccountView, accountPatch } from '@stillroom/shared/contracts';
import { Router } from 'express';
import type { EntityManager } from 'typeorm';
import * as z from 'zod/mini';
import { notFound, signedOut } from '../../errors.ts';
import { route } from '../../http/route.ts';
import type { Services } from '../../services.ts';
import { lettersShownOf } from '../mail/index.ts';
import { browserInWords } from './browser-words.ts';
import { endSession, endSessions, sessionsOf } from './commands/end-sessions.ts';
import { changePassword } from './commands/set-password.ts';
import { PersonEntity } from './entities/person.ts';
import { findPerson } from './people.ts';
import { presentMe } from './person.presenter.ts';
import { sessionName } from './session.ts';

const sessionParams = z.object({ session: z.string().check(z.maxLength(100)) });

/** One's own account: name, password, sessions. */
export function accountRoutes(services: Services): Router {
  const router = Router();

  router.get(
    '/api/account',
    route(services, {
      limit: 'reading',
      who: 'person',
      handle: ({ person, manager, request }) => presentAccount(manager, person.id, request.sessionID),
    }),
  );

  router.patch(
    '/api/account',
    route(services, {
      limit: 'guesses',
      who: 'person',
      body: accountPatch,
      async handle({ person, body, manager, request }) {
        const { name, password } = body;
        const account = await loadAccount(manager, person.id);
        if (name !== undefined) await manager.update(PersonEntity, account.id, { name });
        if (password !== undefined) {
          await changePassword(services, manager, account, password, request.sessionID);
        }
        return presentAccount(manager, person.id, request.sessionID);
      },
    }),
  );

  router.delete(
    '/api/account/sessions',
    route(services, {
      limit: 'writing',
      who: 'person',
      handle: ({ person, manager, request }) => endSessions(manager, person.id, request.sessionID),
    }),
  );

  router.delete(
    '/api/account/sessions/:session',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: sessionParams,
      async handle({ person, params, manager }) {
        if (!(await endSession(manager, person.id, params.session))) throw notFound('session');
      },
    }),
  );

  return router;
}

async function loadAccount(manager: EntityManager, id: string): Promise<PersonEntity> {
  const account = await findPerson(manager, id);
  if (account === null) throw signedOut();
  return account;
}

async function presentAccount(manager: EntityManager, id: string, sid: string): Promise<AccountView> {
  const account = await loadAccount(manager, id);
  const sessions = await sessionsOf(manager, id);
  return {
    ...presentMe(account),
    since: account.createdAt.toISOString(),
    sessions: sessions.map(({ sid: other, browser, begun, seen }) => ({
      id: sessionName(other),
      browser: browserInWords(browser ?? ''),
      begun: begun ?? account.createdAt.toISOString(),
      lastSeen: seen ?? begun ?? account.createdAt.toISOString(),
      current: other === sid,
    })),
    lettersShown: await lettersShownOf(manager, id),
  };
}
