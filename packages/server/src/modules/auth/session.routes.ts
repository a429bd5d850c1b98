import { signInRequest, type SessionView } from '@stillroom/shared/contracts';
import { type Request, Router } from 'express';
import type passport from 'passport';
import { announce } from '../../events.ts';
import { route } from '../../http/route.ts';
import type { Services } from '../../services.ts';
import { beginSession, checkCredentials } from './passport.ts';
import { sessionName } from './session.ts';
import { readSettings } from './settings.ts';

/** Signing in and out, and who is signed in. */
export function sessionRoutes(services: Services, authenticator: passport.Authenticator): Router {
  const router = Router();

  router.get(
    '/api/session',
    route(services, {
      limit: 'reading',
      who: 'anyone',
      async handle({ person, manager }): Promise<SessionView> {
        const { signUp, demo, demoReview } = await readSettings(manager);
        if (!services.config.DEMO) return { me: person, signUp, demo: [] };
        return { me: person, signUp, demo, ...(demoReview === null ? {} : { demoReview }) };
      },
    }),
  );

  router.post(
    '/api/session',
    route(services, {
      limit: 'guesses',
      who: 'anyone',
      body: signInRequest,
      transaction: false,
      async handle({ body, request }) {
        request.body = body;
        const person = await checkCredentials(authenticator, request);
        if (person !== null) await beginSession(request, person);
        return person;
      },
    }),
  );

  router.delete(
    '/api/session',
    route(services, {
      limit: 'writing',
      who: 'anyone',
      async handle({ person, request, manager }) {
        if (person === null) return;
        const session = sessionName(request.sessionID);
        await announce(manager, 'session.ended', { person: person.id, session, except: null });
        await destroySession(request);
      },
    }),
  );

  return router;
}

const destroySession = (request: Request): Promise<void> =>
  new Promise((resolve, reject) => {
    request.session.destroy((error?: unknown) => (error ? reject(error as Error) : resolve()));
  });
