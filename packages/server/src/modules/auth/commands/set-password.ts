import type { EntityManager } from 'typeorm';
import { publicAddress } from '../../../config/index.ts';
import { invalid } from '../../../errors.ts';
import type { Services } from '../../../services.ts';
import { newPassword, passwordChanged, queueMail } from '../../mail/index.ts';
import { PersonEntity } from '../entities/person.ts';
import { hashPassword, isPassword } from '../passwords.ts';
import { findPersonByEmail } from '../people.ts';
import { issueToken, redeemToken } from '../tokens.ts';
import { endSessions } from './end-sessions.ts';

/** Sends a link for setting a new password, where the address has an account; says nothing where not. */
export async function askForNewPassword(
  { config }: Services,
  manager: EntityManager,
  email: string,
): Promise<void> {
  const person = await findPersonByEmail(manager, email);
  if (person === null) return;
  const token = await issueToken(manager, person.id, 'new-password');
  const link = `${publicAddress(config)}/new-password/${token}`;
  await queueMail(manager, newPassword(person.email, person.name, link));
}

/**
 * Sets a new password by the link, which also proves the address, and ends all sessions.
 * @throws gone
 */
export async function setPasswordByLink(
  { config }: Services,
  manager: EntityManager,
  token: string,
  password: string,
): Promise<void> {
  const person = await redeemToken(manager, token, 'new-password');
  await manager.update(PersonEntity, person.id, {
    passwordHash: await hashPassword(password),
    confirmedAt: person.confirmedAt ?? new Date(),
  });
  await manager.query('delete from password_guess where key = $1 or key like $2', [
    person.email,
    `${person.email.replace(/[\\%_]/gu, '\\$&')} %`,
  ]);
  await endSessions(manager, person.id, null);
  await tellOwner(config, manager, person);
}

/**
 * Changes the password of someone signed in, and ends the other sessions.
 * @throws invalid where the present password is not right.
 */
export async function changePassword(
  { config }: Services,
  manager: EntityManager,
  person: PersonEntity,
  { current, next }: { readonly current: string; readonly next: string },
  session: string,
): Promise<void> {
  if (!(await isPassword(person.passwordHash, current))) {
    throw invalid('The present password is not right.', {
      fields: { 'password.current': 'This is not your present password.' },
    });
  }
  await manager.update(PersonEntity, person.id, { passwordHash: await hashPassword(next) });
  await endSessions(manager, person.id, session);
  await tellOwner(config, manager, person);
}

async function tellOwner(
  config: Services['config'],
  manager: EntityManager,
  person: PersonEntity,
): Promise<void> {
  const link = `${publicAddress(config)}/new-password`;
  await queueMail(manager, passwordChanged(person.email, person.name, link));
}
