import type { EntityManager } from 'typeorm';
import { conflict } from '../../../errors.ts';
import { PersonEntity } from '../entities/person.ts';
import { hashPassword } from '../passwords.ts';
import { findPersonByEmail } from '../people.ts';

interface NewPerson {
  readonly email: string;
  readonly name: string;
  readonly password: string;
  /** Whether the address is proven already: by an invitation that came to it. */
  readonly confirmed: boolean;
  readonly operator?: boolean;
}

/**
 * Opens an account. Colours are given in turn.
 * @throws conflict where the address has an account.
 */
export async function createPerson(manager: EntityManager, asked: NewPerson): Promise<PersonEntity> {
  if ((await findPersonByEmail(manager, asked.email)) !== null) {
    throw conflict('There is an account with this address already.', { hint: 'Sign in with it.' });
  }
  const passwordHash = await hashPassword(asked.password);
  const people = await manager.count(PersonEntity);
  return manager.save(
    manager.create(PersonEntity, {
      email: asked.email,
      name: asked.name,
      hue: people % 6,
      passwordHash,
      operator: asked.operator ?? false,
      confirmedAt: asked.confirmed ? new Date() : null,
      seenAt: null,
    }),
  );
}
