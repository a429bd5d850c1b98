import type { OutboxMail } from '@stillroom/shared/contracts';
import { type EntityManager, In } from 'typeorm';
import { announce } from '../../events.ts';
import { forbidden, gone, notFound } from '../../errors.ts';
import { LetterShowingEntity } from './entities/letter-showing.ts';
import { MailEntity } from './entities/mail.ts';
import type { Letter } from './letter.ts';

/** What the outbox has to know of a letter beside its words. */
export interface Handling {
  /** The group whose trail tells that it was shown. */
  readonly group?: string;
  /** The letter goes to a masked reviewer, who is called this wherever the address does not have to be. */
  readonly maskedAs?: string;
}

/** Puts a letter into the outbox, in the transaction of what it tells of: both happen or neither. */
export async function queueMail(
  manager: EntityManager,
  letter: Letter,
  { group, maskedAs }: Handling = {},
): Promise<void> {
  const { to, subject, text, html, opens } = letter;
  await manager.insert(MailEntity, {
    recipient: to,
    subject,
    text,
    html,
    opens,
    group: group ?? null,
    masked: maskedAs !== undefined,
    reader: maskedAs ?? null,
  });
  await announce(manager, 'mail.queued', {});
}

/** The newest letters, for the operator: words only of those whose link opens nothing. */
export async function readOutbox(
  manager: EntityManager,
  hasMailServer: boolean,
  most = 200,
): Promise<OutboxMail[]> {
  const mails = await manager.find(MailEntity, { order: { at: 'DESC' }, take: most });
  const showings = await manager.find(LetterShowingEntity, {
    where: { mail: In(mails.map(({ id }) => id)) },
    order: { id: 'ASC' },
  });
  const shown = new Map(showings.map(({ mail, at }) => [mail, at.toISOString()]));
  return mails.map((mail) => ({
    id: mail.id,
    at: mail.at.toISOString(),
    to: mail.masked ? (mail.reader ?? 'A masked reviewer') : mail.recipient,
    subject: mail.subject,
    text: mail.opens === 'nothing' ? mail.text : null,
    sealed: sealOf(mail, hasMailServer),
    shownAt: shown.get(mail.id) ?? null,
    state: mail.state,
  }));
}

/** Why a letter is not simply there to be read. */
function sealOf({ opens, state }: MailEntity, hasMailServer: boolean): OutboxMail['sealed'] {
  if (opens === 'nothing') return null;
  if (state === 'sent') return 'delivered';
  return opens === 'account' && hasMailServer ? 'by mail alone' : 'on request';
}

/**
 * A letter whose link opens something, to be shown to the operator who asked for it and handed on.
 * @throws not-found; gone where it was delivered; forbidden where it opens an account and a mail server carries it.
 */
export async function loadSealedLetter(
  manager: EntityManager,
  id: string,
  hasMailServer: boolean,
): Promise<MailEntity> {
  const mail = await manager.findOneBy(MailEntity, { id });
  if (mail === null || mail.opens === 'nothing') throw notFound('letter');
  const seal = sealOf(mail, hasMailServer);
  if (seal === 'delivered') {
    throw gone('This letter was delivered; its words are not kept here.', {
      hint: 'Whoever needs its link again asks for a new letter.',
    });
  }
  if (seal === 'by mail alone') {
    throw forbidden('The link of this letter opens somebody’s account, and a mail server carries it.', {
      hint: 'Look at Mail under Health. Without a mail server such a letter can be shown, to be handed on.',
    });
  }
  return mail;
}

/** Writes down that an operator was shown a letter; `person` is whose account its link opens. */
export async function recordShowing(
  manager: EntityManager,
  { id, subject }: MailEntity,
  by: string,
  person: string | null,
): Promise<void> {
  await manager.insert(LetterShowingEntity, { mail: id, by, person, subject });
}

/** Letters to a person, with a link to the account, that an operator was shown; newest first. */
export async function lettersShownOf(
  manager: EntityManager,
  person: string,
): Promise<{ readonly at: string; readonly subject: string }[]> {
  const showings = await manager.find(LetterShowingEntity, {
    where: { person },
    order: { id: 'DESC' },
    take: 20,
  });
  return showings.map(({ at, subject }) => ({ at: at.toISOString(), subject }));
}

/** How many letters wait, and how many were given up. */
export async function countOutbox(manager: EntityManager): Promise<{ waiting: number; failed: number }> {
  const waiting = await manager.countBy(MailEntity, { state: 'waiting' });
  const failed = await manager.countBy(MailEntity, { state: 'failed' });
  return { waiting, failed };
}
