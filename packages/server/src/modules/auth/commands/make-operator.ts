import type { EntityManager } from 'typeorm';
import { PersonEntity } from '../entities/person.ts';
import { findPersonByEmail } from '../people.ts';
import { newToken } from '../secrets.ts';
import { issueToken } from '../tokens.ts';
import { createPerson } from './create-person.ts';

/**
 * Gives somebody the operator's standing, with an account where there is none. Done by whoever can run programs on the
 * machine: the first operator has nobody to ask.
 * @returns a token for setting a password where the account is new, else null.
 */
export async function makeOperator(
  manager: EntityManager,
  email: string,
  name: string,
): Promise<string | null> {
  const known = await findPersonByEmail(manager, email);
  if (known !== null) {
    await manager.update(PersonEntity, known.id, { operator: true });
    return null;
  }
  const password = newToken();
  const person = await createPerson(manager, { email, name, password, confirmed: true, operator: true });
  return issueToken(manager, person.id, 'new-password');
}
