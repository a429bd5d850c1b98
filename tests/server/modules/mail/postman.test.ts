import { afterAll, beforeAll, expect, test, vi } from 'vitest';
import { newPassword, queueMail } from '../../../../packages/server/src/modules/mail/index.ts';
import { catchMail, type MailCatcher } from '../../../support/mail-catcher.ts';
import { startTestServer, type TestServer } from '../../../support/server.ts';

let catcher: MailCatcher;
let server: TestServer;
beforeAll(async () => {
  catcher = await catchMail();
  server = await startTestServer({ MAIL_URL: catcher.url, MAIL_FROM: 'Stillroom <post@example.org>' });
});
afterAll(async () => {
  await server.stop();
  await catcher.stop();
});

const letterTo = (to: string) => newPassword(to, 'Ada <b>Quill</b>', 'http://localhost/new-password/abc_def');
const stateOf = async (to: string) => {
  const rows = await server.sql<{ state: string; attempts: number; complaint: string | null }>(
    'select state, attempts, complaint from mail where recipient = $1',
    [to],
  );
  return rows[0];
};

test('a letter goes out once its transaction is committed, as text and HTML', async () => {
  const { database } = server.services;
  await database.transaction(async (manager) => {
    await queueMail(manager, letterTo('one@example.org'));
    expect(catcher.mails).toHaveLength(0);
  });
  await vi.waitFor(async () => expect((await stateOf('one@example.org'))?.state).toBe('sent'), 5000);
  const [mail] = catcher.mails;
  expect(mail).toMatchObject({ from: 'post@example.org', to: 'one@example.org' });
  const source = (mail?.source ?? '').replaceAll('=\n', '');
  expect(source).toContain('Content-Type: text/plain');
  expect(source).toContain('Content-Type: text/html');
  expect(source).toContain('http://localhost/new-password/abc_def');
  // What people call themselves is never markup.
  expect(source).toContain('Hello Ada &lt;b&gt;Quill&lt;/b&gt;,');
});

test('a letter of a transaction that was rolled back never goes out', async () => {
  const { database } = server.services;
  const before = catcher.mails.length;
  await expect(
    database.transaction(async (manager) => {
      await queueMail(manager, letterTo('never@example.org'));
      throw new Error('changed my mind');
    }),
  ).rejects.toThrow('changed my mind');
  await queueMail(database.manager, letterTo('after@example.org'));
  await vi.waitFor(() => expect(catcher.mails.length).toBe(before + 1), 5000);
  expect(catcher.mails.at(-1)?.to).toBe('after@example.org');
});

test('a letter that is turned away waits, with what the mail server said', async () => {
  catcher.refuse = true;
  await queueMail(server.services.database.manager, letterTo('later@example.org'));
  await vi.waitFor(async () => expect((await stateOf('later@example.org'))?.attempts).toBe(1), 5000);
  catcher.refuse = false;
  expect(await stateOf('later@example.org')).toMatchObject({
    state: 'waiting',
    complaint: expect.stringContaining('come back later') as string,
  });
});
