import type { ShownLetter } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';
import type { Config } from '../../config/index.ts';
import { findPersonByEmail } from '../auth/index.ts';
import { recordAudit } from '../groups/index.ts';
import { loadSealedLetter, type MailEntity, recordShowing } from '../mail/index.ts';

/**
 * Shows an operator a letter whose link opens something, to be handed on, and writes that down where its reader or the
 * group sees it.
 * @throws not-found, gone, forbidden; see `loadSealedLetter`
 */
export async function showLetter(
  manager: EntityManager,
  config: Config,
  by: string,
  id: string,
): Promise<ShownLetter> {
  const mail = await loadSealedLetter(manager, id, config.MAIL_URL !== undefined);
  const owner = mail.opens === 'account' ? await findPersonByEmail(manager, mail.recipient) : null;
  await recordShowing(manager, mail, by, owner?.id ?? null);
  if (mail.group !== null) {
    const words = `as operator was shown the letter that invites ${readerOf(mail)}, to hand it on`;
    await recordAudit(manager, { group: mail.group, by, verb: 'letter.shown', words });
  }
  return { id: mail.id, to: mail.recipient, subject: mail.subject, text: mail.text };
}

const readerOf = ({ masked, reader, recipient }: MailEntity): string =>
  masked ? (reader ?? 'a masked reviewer') : recipient;
