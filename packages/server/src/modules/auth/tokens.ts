import type { EntityManager } from 'typeorm';
import { gone } from '../../errors.ts';
import { AccountTokenEntity, type TokenPurpose } from './entities/account-token.ts';
import type { PersonEntity } from './entities/person.ts';
import { findPerson } from './people.ts';
import { digestOf, newToken } from './secrets.ts';

const hours: Readonly<Record<TokenPurpose, number>> = { confirm: 48, 'new-password': 1 };

/** Makes a link's token for a person; earlier ones for the same purpose stop working. */
export async function issueToken(
  manager: EntityManager,
  person: string,
  purpose: TokenPurpose,
): Promise<string> {
  const token = newToken();
  const until = new Date(Date.now() + hours[purpose] * 3_600_000);
  await manager.delete(AccountTokenEntity, { person, purpose });
  await manager.insert(AccountTokenEntity, { digest: digestOf(token), person, purpose, until });
  return token;
}

/**
 * Uses a token up.
 * @throws gone where it is unknown, used or has run out.
 */
export async function redeemToken(
  manager: EntityManager,
  token: string,
  purpose: TokenPurpose,
): Promise<PersonEntity> {
  const found = await manager.findOne(AccountTokenEntity, {
    where: { digest: digestOf(token), purpose },
    lock: { mode: 'pessimistic_write' },
  });
  const person = found === null ? null : await findPerson(manager, found.person);
  if (found === null || person === null) {
    throw gone('This link does not work (any more).', {
      hint: 'A newer letter makes older links void: use the newest one.',
    });
  }
  if (found.usedAt !== null) {
    throw gone('This link has been used already; it works once.', { hint: 'Sign in, or ask for a new one.' });
  }
  if (found.until.getTime() < Date.now()) {
    throw gone('This link has run out.', { hint: 'Ask for a new one.' });
  }
  await manager.update(AccountTokenEntity, { digest: found.digest }, { usedAt: new Date() });
  return person;
}
