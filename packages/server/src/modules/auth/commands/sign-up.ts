import type { EntityManager } from 'typeorm';
import { publicAddress } from '../../../config/index.ts';
import { forbidden, invalid } from '../../../errors.ts';
import type { Services } from '../../../services.ts';
import { accountExists, confirmAccount, queueMail } from '../../mail/index.ts';
import type { PersonEntity } from '../entities/person.ts';
import { findPersonByEmail } from '../people.ts';
import { readSettings } from '../settings.ts';
import { issueToken } from '../tokens.ts';
import { createPerson } from './create-person.ts';

/** Knows which address an invitation was sent to; the groups, which come after this module, supply it. */
export type InvitedAddress = (manager: EntityManager, token: string) => Promise<string | null>;

interface SignUp {
  readonly email: string;
  readonly name: string;
  readonly password: string;
  readonly invitation?: string | undefined;
}

/**
 * Opens an account. With an invitation its address is proven, and the person is returned to be signed in. Without one
 * a letter goes out, and null is returned also where the address has an account already: the page must not tell.
 * @throws forbidden where this installation takes invited people only; invalid where the address is not the invited one.
 */
export async function signUp(
  { config }: Services,
  manager: EntityManager,
  asked: SignUp,
  invitedAddress: InvitedAddress,
): Promise<PersonEntity | null> {
  if (asked.invitation !== undefined) {
    await checkInvitation(manager, asked.email, asked.invitation, invitedAddress);
    return createPerson(manager, { ...asked, confirmed: true });
  }
  const { signUp: door } = await readSettings(manager);
  if (door === 'invitation') {
    throw forbidden('This installation takes people by invitation.', {
      hint: 'Ask a lead of your group to invite you; the letter holds the link to sign up with.',
    });
  }
  const known = await findPersonByEmail(manager, asked.email);
  const address = publicAddress(config);
  if (known !== null) {
    await queueMail(manager, accountExists(known.email, known.name, `${address}/new-password`));
    return null;
  }
  const person = await createPerson(manager, { ...asked, confirmed: false });
  await sendConfirmation(config, manager, person);
  return null;
}

/** Sends the letter that proves the address; earlier ones stop working. */
export async function sendConfirmation(
  config: Services['config'],
  manager: EntityManager,
  person: PersonEntity,
): Promise<void> {
  const token = await issueToken(manager, person.id, 'confirm');
  const link = `${publicAddress(config)}/confirm/${token}`;
  await queueMail(manager, confirmAccount(person.email, person.name, link));
}

async function checkInvitation(
  manager: EntityManager,
  email: string,
  token: string,
  invitedAddress: InvitedAddress,
): Promise<void> {
  const invited = await invitedAddress(manager, token);
  if (invited === null) {
    throw forbidden('This invitation does not work (any more).', { hint: 'Ask for a new one.' });
  }
  if (invited !== email) {
    throw invalid(`The invitation was sent to ${invited}: sign up with that address.`, {
      fields: { email: `The invitation was sent to ${invited}.` },
    });
  }
}
