import type { OutboxMail } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';
import { announce } from '../../events.ts';
import { MailEntity } from './entities/mail.ts';
import type { Letter } from './letter.ts';

/**
 * Puts a letter into the outbox, in the transaction of what it tells of: both happen or neither. `masked` hides its
 * words from the outbox page.
 */
export async function queueMail(
  manager: EntityManager,
  letter: Letter,
  { masked = false }: { readonly masked?: boolean } = {},
): Promise<void> {
  const { to, subject, text, html } = letter;
  await manager.insert(MailEntity, { recipient: to, subject, text, html, masked });
  await announce(manager, 'mail.queued', {});
}

/** The newest letters, for the operator. */
export async function readOutbox(manager: EntityManager, most = 200): Promise<OutboxMail[]> {
  const mails = await manager.find(MailEntity, { order: { at: 'DESC' }, take: most });
  return mails.map(({ id, at, recipient, subject, text, masked, state }) => ({
    id,
    at: at.toISOString(),
    to: recipient,
    subject,
    text: masked ? null : text,
    state,
  }));
}

/** How many letters wait, and how many were given up. */
export async function countOutbox(manager: EntityManager): Promise<{ waiting: number; failed: number }> {
  const waiting = await manager.countBy(MailEntity, { state: 'waiting' });
  const failed = await manager.countBy(MailEntity, { state: 'failed' });
  return { waiting, failed };
}
