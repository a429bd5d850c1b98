import type { Request } from 'express';
import passport from 'passport';
import { Strategy } from 'passport-local';
import * as z from 'zod/mini';
import type { SignedIn } from '../../http/authenticate.ts';
import type { Services } from '../../services.ts';
import { checkSignIn } from './commands/sign-in.ts';
import { findPerson } from './people.ts';
import { presentMe } from './person.presenter.ts';

const personId = z.uuid();

/** Passport with one strategy, address and password; a session holds the person's id and nothing else. */
export function createPassport({ database }: Services): passport.Authenticator {
  const authenticator = new passport.Passport();
  authenticator.use(
    new Strategy({ usernameField: 'email', passReqToCallback: true }, (request, email, password, done) => {
      checkSignIn(database, email, password, request.ip ?? 'unknown').then(
        (person) => done(null, presentMe(person)),
        done,
      );
    }),
  );
  authenticator.serializeUser<string>((user, done) => done(null, (user as SignedIn).id));
  authenticator.deserializeUser<string>((id, done) => {
    findSignedIn(database, id).then((person) => done(null, person ?? false), done);
  });
  return authenticator;
}

/** The person a session speaks of; null where there is none (any more). */
export async function findSignedIn(database: Services['database'], id: string): Promise<SignedIn | null> {
  const person = z.safeParse(personId, id).success ? await findPerson(database.manager, id) : null;
  return person === null ? null : presentMe(person);
}

/** Checks address and password of a request's body; the body is valid already. */
export function checkCredentials(
  authenticator: passport.Authenticator,
  request: Request,
): Promise<SignedIn | null> {
  return new Promise((resolve, reject) => {
    const answered: passport.AuthenticateCallback = (error: unknown, user) => {
      if (error !== null && error !== undefined) reject(error as Error);
      else resolve(user ? (user as SignedIn) : null);
    };
    authenticator.authenticate('local', { session: false }, answered)(request, request.res, reject);
  });
}

/** Signs in: a fresh session under a new name, so that one planted before is worth nothing. */
export function beginSession(request: Request, person: SignedIn): Promise<void> {
  return new Promise((resolve, reject) => {
    request.logIn(person, (error?: unknown) => {
      if (error !== undefined && error !== null) return reject(error as Error);
      const now = new Date().toISOString();
      request.session.begun = now;
      request.session.seen = now;
      request.session.browser = request.get('user-agent')?.slice(0, 300) ?? '';
      request.session.save((failure?: unknown) => (failure ? reject(failure as Error) : resolve()));
    });
  });
}
