import type { DataSource } from 'typeorm';
import { unconfirmed, wrongPassword } from '../../../errors.ts';
import type { PersonEntity } from '../entities/person.ts';
import { countGuess, forgetGuesses, refuseManyGuesses } from '../guesses.ts';
import { isPassword } from '../passwords.ts';
import { findPersonByEmail } from '../people.ts';

/**
 * The person with that address and password. Each failure is counted in a transaction of its own.
 * @throws too-many, wrong-password, unconfirmed
 */
export async function checkSignIn(
  database: DataSource,
  email: string,
  password: string,
  address: string,
): Promise<PersonEntity> {
  const { manager } = database;
  await refuseManyGuesses(manager, email, address);
  const person = await findPersonByEmail(manager, email);
  if (!(await isPassword(person?.passwordHash ?? null, password)) || person === null) {
    await countGuess(manager, email, address);
    throw wrongPassword('That address and password do not belong together.', {
      hint: 'Check both; capitals count in the password. A forgotten password can be set anew by mail.',
    });
  }
  if (person.confirmedAt === null) {
    throw unconfirmed(`The address ${email} is not confirmed yet.`, {
      hint: 'Open the link in the letter we sent to it. Setting a new password by mail confirms it too.',
    });
  }
  await forgetGuesses(manager, email, address);
  return person;
}
