import type {
  AccountView,
  AuditPage,
  HealthView,
  OperatorPerson,
  OutboxMail,
  SessionView,
} from '@stillroom/shared/contracts';
import { engineVersion } from '@stillroom/shared/plan';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import {
  newPassword,
  passwordChanged,
  queueMail,
  reviewInvitation,
} from '../../packages/server/src/modules/mail/index.ts';
import { buildGroup, buildPerson, signIn } from '../support/build.ts';
import { catchMail } from '../support/mail-catcher.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

let server: TestServer;
let visitor: Visitor;
beforeAll(async () => {
  server = await startTestServer();
  visitor = await signIn(server, await buildPerson(server, { operator: true, name: 'Op Erator' }));
});
afterAll(() => server.stop());

describe('the operator', () => {
  test('sees the health line by line, the sealed tables by name', async () => {
    const { version, engine, lines } = (await visitor.get('/api/operator/health')).body as HealthView;
    expect(version).toMatch(/^\d+\.\d+\.\d+$/u);
    expect(engine).toBe(engineVersion);
    const line = (name: string) => lines.find((candidate) => candidate.name === name);
    expect(line('Database')).toMatchObject({
      state: 'well',
      words: expect.stringContaining('PostgreSQL') as string,
    });
    expect(line('Sealed tables')).toMatchObject({
      state: 'well',
      words: expect.stringContaining('audit') as string,
    });
    expect(line('Mail')).toMatchObject({
      state: 'warning',
      words: expect.stringContaining('MAIL_URL') as string,
    });
  });

  test('is told when a seal was broken', async () => {
    await server.sql('alter table audit disable trigger sealed');
    const broken = (await visitor.get('/api/operator/health')).body as HealthView;
    await server.sql('alter table audit enable trigger sealed');
    expect(broken.lines.find(({ name }) => name === 'Sealed tables')).toMatchObject({
      state: 'ill',
      words: expect.stringContaining('audit') as string,
    });
  });

  test('sees people, with the number of their groups and no password', async () => {
    const person = await buildPerson(server, { name: 'Aa First' });
    await buildGroup(server, person);
    const people = (await visitor.get('/api/operator/people')).body as OperatorPerson[];
    expect(people[0]).toMatchObject({ name: 'Aa First', groups: 1, operator: false });
    expect(JSON.stringify(people)).not.toContain('argon2');
  });

  test('opens and closes the door for new people', async () => {
    const read = async () => ((await new Visitor(server.url).get('/api/session')).body as SessionView).signUp;
    expect(await read()).toBe('invitation');
    await visitor.patch('/api/operator/settings', { signUp: 'open' });
    expect(await read()).toBe('open');
    await visitor.patch('/api/operator/settings', { signUp: 'invitation' });
    expect(await read()).toBe('invitation');
    expect((await visitor.patch('/api/operator/settings', { signUp: 'wide' })).status).toBe(400);
  });
});

describe('the outbox', () => {
  const outbox = async () => (await visitor.get('/api/operator/outbox')).body as OutboxMail[];
  const newest = async (subject: RegExp) => (await outbox()).find((mail) => subject.test(mail.subject));
  const show = (id: string | undefined) => visitor.post(`/api/operator/outbox/${id}/showing`);
  const review = (to: string) =>
    reviewInvitation({
      to,
      name: '',
      by: 'Lena Ad',
      group: 'Kinetics',
      record: 'record No. 1',
      message: '',
      until: '1 January 2027',
      link: 'http://localhost/review/secret-token',
    });

  test('shows letters whose link opens nothing, and no words of any other', async () => {
    const { manager } = server.services.database;
    await queueMail(manager, passwordChanged('told@example.org', 'Told', 'http://localhost/new-password'));
    await queueMail(manager, newPassword('forgot@example.org', 'F', 'http://localhost/new-password/secret'));
    await queueMail(manager, review('named@example.org'));
    await queueMail(manager, review('masked@example.org'), { maskedAs: 'Reviewer 2' });
    const mails = await outbox();
    expect(mails.find(({ to }) => to === 'told@example.org')).toMatchObject({
      text: expect.stringContaining('was changed') as string,
      sealed: null,
    });
    for (const to of ['forgot@example.org', 'named@example.org', 'Reviewer 2'])
      expect(mails.find((mail) => mail.to === to)).toMatchObject({ text: null, sealed: 'on request' });
    expect(JSON.stringify(mails)).not.toMatch(/secret|masked@example/u);
  });

  test('shows an account’s letter on request alone, and tells its owner', async () => {
    const owner = await buildPerson(server, { email: 'owner@example.org' });
    await new Visitor(server.url).post('/api/password-resets', { email: 'owner@example.org' });
    const mail = (await outbox()).find(({ to }) => to === 'owner@example.org');
    const asOwner = await signIn(server, owner);
    const account = async () => (await asOwner.get('/api/account')).body as AccountView;
    expect((await account()).lettersShown).toEqual([]);
    const { status, body } = await show(mail?.id);
    expect([status, body]).toMatchObject([
      200,
      { to: 'owner@example.org', text: expect.stringMatching(/\/new-password\/[\w-]{20,}/u) as string },
    ]);
    expect((await account()).lettersShown).toMatchObject([{ subject: 'Set a new password for Stillroom' }]);
    expect((await newest(/new password/u))?.shownAt).toEqual(expect.any(String));
    // The trail of it is sealed.
    await expect(server.sql('delete from letter_showing')).rejects.toThrow('never altered');
  });

  test('shows invitations on request alone, and the group’s trail knows; a masked reviewer by number', async () => {
    const lead = await buildPerson(server);
    const group = await buildGroup(server, lead);
    const asLead = await signIn(server, lead);
    const invitation = { email: 'guest@example.org', role: 'reader', notebooks: null, message: '' };
    await asLead.post(`/api/groups/${group.id}/invitations`, invitation);
    const { manager } = server.services.database;
    await queueMail(manager, review('dr.secret@example.org'), { group: group.id, maskedAs: 'Reviewer 7' });
    const mails = await outbox();
    for (const to of ['guest@example.org', 'Reviewer 7'])
      expect((await show(mails.find((mail) => mail.to === to)?.id)).status).toBe(200);
    const { entries } = (await asLead.get(`/api/groups/${group.id}/audit`)).body as AuditPage;
    const told = entries.filter(({ verb }) => verb === 'letter.shown');
    expect(told.map(({ by, words }) => [by?.name, words])).toEqual([
      ['Op Erator', 'as operator was shown the letter that invites Reviewer 7, to hand it on'],
      ['Op Erator', 'as operator was shown the letter that invites guest@example.org, to hand it on'],
    ]);
    expect(JSON.stringify(entries)).not.toContain('dr.secret');
  });

  test('is asked for a letter by an operator alone, and for one that is there', async () => {
    const someone = await signIn(server, await buildPerson(server));
    const mail = await newest(/new password/u);
    expect((await someone.post(`/api/operator/outbox/${mail?.id}/showing`)).status).toBe(403);
    expect((await show(crypto.randomUUID())).status).toBe(404);
  });

  test('with a mail server shows no letter about an account, and keeps no words of what was delivered', async () => {
    const catcher = await catchMail();
    const mailing = await startTestServer({ MAIL_URL: catcher.url });
    try {
      const operator = await signIn(mailing, await buildPerson(mailing, { operator: true }));
      const showing = async (to: string) => {
        const mails = (await operator.get('/api/operator/outbox')).body as OutboxMail[];
        const mail = mails.find((one) => one.to === to);
        return { mail, answer: await operator.post(`/api/operator/outbox/${mail?.id}/showing`) };
      };
      const { manager } = mailing.services.database;
      catcher.refuse = true;
      await queueMail(manager, newPassword('late@example.org', 'L', 'http://localhost/new-password/secret'));
      const late = await showing('late@example.org');
      expect(late.mail?.sealed).toBe('by mail alone');
      expect(late.answer).toMatchObject({ status: 403, body: { hint: expect.any(String) as string } });
      catcher.refuse = false;
      await queueMail(manager, review('named@example.org'));
      const stored = () => mailing.sql(`select text, html from mail where recipient = 'named@example.org'`);
      await expect.poll(stored, { timeout: 10_000 }).toEqual([{ text: '', html: '' }]);
      expect(catcher.mails.map(({ source }) => source).join('')).toContain('secret-token');
      const delivered = await showing('named@example.org');
      expect(delivered.mail?.sealed).toBe('delivered');
      expect(delivered.answer.status).toBe(410);
    } finally {
      await mailing.stop();
      await catcher.stop();
    }
  });
});

describe('the demo', () => {
  test('accounts are shown on a demo installation only', async () => {
    await server.sql(
      `insert into setting values ('demo', '[{"email":"a@b.c","password":"p","role":"lead"}]')`,
    );
    const { demo } = (await new Visitor(server.url).get('/api/session')).body as SessionView;
    expect(demo).toEqual([]);
  });
});
