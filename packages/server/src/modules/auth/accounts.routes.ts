import { emailRequest, newPasswordRequest, signUpRequest, tokenRequest } from '@stillroom/shared/contracts';
import { Router } from 'express';
import { conflict } from '../../errors.ts';
import { route } from '../../http/route.ts';
import type { Services } from '../../services.ts';
import { askForNewPassword, setPasswordByLink } from './commands/set-password.ts';
import { type InvitedAddress, signUp } from './commands/sign-up.ts';
import { PersonEntity } from './entities/person.ts';
import { beginSession } from './passport.ts';
import { presentMe } from './person.presenter.ts';
import { redeemToken } from './tokens.ts';

/** What people do who are not signed in yet: open an account, prove an address, set a new password. */
export function accountsRoutes(services: Services, invitedAddress: InvitedAddress): Router {
  const router = Router();

  router.post(
    '/api/accounts',
    route(services, {
      limit: 'letters',
      who: 'anyone',
      body: signUpRequest,
      status: 202,
      async handle({ body, manager, request, response }) {
        const person = await signUp(services, manager, body, invitedAddress);
        if (person === null) return;
        await beginSession(request, presentMe(person));
        response.status(201);
        return presentMe(person);
      },
    }),
  );

  router.post(
    '/api/accounts/confirm',
    route(services, {
      limit: 'guesses',
      who: 'anyone',
      body: tokenRequest,
      async handle({ person: here, body, manager, request }) {
        const person = await redeemToken(manager, body.token, 'confirm');
        // The link stays good: what is refused is not committed.
        if (here !== null && here.id !== person.id) {
          throw conflict(`This link is for ${person.email}; you are signed in as ${here.email}.`, {
            hint: 'Sign out first, then open the link again.',
          });
        }
        await manager.update(PersonEntity, person.id, { confirmedAt: new Date() });
        await beginSession(request, presentMe(person));
        return presentMe(person);
      },
    }),
  );

  router.post(
    '/api/password-resets',
    route(services, {
      limit: 'letters',
      who: 'anyone',
      body: emailRequest,
      status: 202,
      handle: ({ body, manager }) => askForNewPassword(services, manager, body.email),
    }),
  );

  router.put(
    '/api/password-resets',
    route(services, {
      limit: 'guesses',
      who: 'anyone',
      body: newPasswordRequest,
      handle: ({ body, manager }) => setPasswordByLink(services, manager, body.token, body.password),
    }),
  );

  return router;
}
