import { createTransport, type Transporter } from 'nodemailer';
import { LessThanOrEqual } from 'typeorm';
import { describeError } from '../../logger.ts';
import type { ServerModule, Services } from '../../services.ts';
import { MailEntity } from './entities/mail.ts';

/** A letter is tried again after these minutes, then given up. */
const pauses = [1, 5, 30, 120, 720];
/** Looks for letters due again this often; new ones are announced. */
const roundEvery = 30_000;

/** Carries letters from the outbox to the mail server. Without one they wait there, and nothing runs. */
export function createPostman(services: Services): ServerModule {
  const { config, events, log } = services;
  if (config.MAIL_URL === undefined) return {};
  const transport = createTransport(config.MAIL_URL);
  let timer: NodeJS.Timeout | null = null;
  let silence: (() => void) | null = null;
  let round: Promise<void> = Promise.resolve();

  const deliver = (): void => {
    round = round.then(() =>
      deliverDue(services, transport).catch((error: unknown) =>
        log.warn('The outbox could not be read.', describeError(error)),
      ),
    );
  };

  return {
    async start() {
      silence = events.on('mail.queued', deliver);
      timer = setInterval(deliver, roundEvery);
      deliver();
    },
    async stop() {
      if (timer !== null) clearInterval(timer);
      silence?.();
      await round;
      transport.close();
    },
  };
}

/** Sends every letter that is due, one at a time; the row stays locked meanwhile, so no other process sends it too. */
async function deliverDue({ config, database }: Services, transport: Transporter): Promise<void> {
  for (let found = true; found;) {
    found = await database.transaction(async (manager) => {
      const mail = await manager.findOne(MailEntity, {
        where: { state: 'waiting', nextAt: LessThanOrEqual(new Date()) },
        order: { nextAt: 'ASC' },
        lock: { mode: 'pessimistic_write', onLocked: 'skip_locked' },
      });
      if (mail === null) return false;
      const { recipient: to, subject, text, html } = mail;
      try {
        await transport.sendMail({ from: config.MAIL_FROM, to, subject, text, html });
        await manager.update(MailEntity, mail.id, {
          state: 'sent',
          attempts: mail.attempts + 1,
          complaint: null,
          // Its link is its reader's alone from now on.
          ...(mail.opens === 'nothing' ? {} : { text: '', html: '' }),
        });
      } catch (error) {
        await manager.update(MailEntity, mail.id, afterFailure(mail, error));
      }
      return true;
    });
  }
}

function afterFailure(mail: MailEntity, error: unknown): Partial<MailEntity> {
  const pause = pauses[mail.attempts];
  const complaint = error instanceof Error ? error.message : String(error);
  const attempts = mail.attempts + 1;
  if (pause === undefined) return { state: 'failed', attempts, complaint };
  return { attempts, complaint, nextAt: new Date(Date.now() + pause * 60_000) };
}
