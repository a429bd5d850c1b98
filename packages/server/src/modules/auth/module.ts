import type { IncomingMessage } from 'node:http';
import { Router } from 'express';
import type { SignedIn } from '../../http/authenticate.ts';
import type { ServerModule, Services } from '../../services.ts';
import { accountRoutes } from './account.routes.ts';
import { accountsRoutes } from './accounts.routes.ts';
import { sessionsOf } from './commands/end-sessions.ts';
import type { InvitedAddress } from './commands/sign-up.ts';
import { createPassport, findSignedIn } from './passport.ts';
import { createSessions, sessionName } from './session.ts';
import { sessionRoutes } from './session.routes.ts';

/** Who is at the other end of a live connection, and by which session. */
export interface Caller {
  readonly person: SignedIn;
  /** Name of the session, as in `session.ended`. */
  readonly session: string;
}

export interface AuthModule extends ServerModule {
  readonly routes: Router;
  /** The person whose session a request bears, read now; also for WebSocket upgrades. Null where nobody is signed in. */
  readPerson(request: IncomingMessage): Promise<Caller | null>;
  /** Whether a session, by its name, still stands. */
  sessionStands(person: string, session: string): Promise<boolean>;
}

/** Accounts and sessions. Its routes also read the session for every module mounted after it. */
export function createAuth(services: Services, invitedAddress: InvitedAddress): AuthModule {
  const sessions = createSessions(services);
  const authenticator = createPassport(services);
  const routes = Router();
  routes.use('/api', sessions.middleware, authenticator.initialize(), authenticator.session());
  routes.use(sessionRoutes(services, authenticator));
  routes.use(accountsRoutes(services, invitedAddress));
  routes.use(accountRoutes(services));
  return {
    routes,
    stop: () => sessions.stop(),
    async sessionStands(person, session) {
      const standing = await sessionsOf(services.database.manager, person);
      return standing.some(({ sid }) => sessionName(sid) === session);
    },
    async readPerson(request) {
      const session = await sessions.read(request);
      const id = session.data.passport?.user;
      const person = id === undefined ? null : await findSignedIn(services.database, id);
      return person === null ? null : { person, session: sessionName(session.sid) };
    },
  };
}
