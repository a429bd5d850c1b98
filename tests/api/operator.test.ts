import type { HealthView, OperatorPerson, OutboxMail, SessionView } from '@stillroom/shared/contracts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { queueMail, reviewInvitation } from '../../packages/server/src/modules/mail/index.ts';
import { buildGroup, buildPerson, signIn } from '../support/build.ts';
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
    const { version, lines } = (await visitor.get('/api/operator/health')).body as HealthView;
    expect(version).toMatch(/^\d+\.\d+\.\d+$/u);
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

  test('reads letters in the outbox, but not those of masked reviewers', async () => {
    const letter = (to: string) =>
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
    const { manager } = server.services.database;
    await queueMail(manager, letter('named@example.org'));
    await queueMail(manager, letter('masked@example.org'), { masked: true });
    const mails = (await visitor.get('/api/operator/outbox')).body as OutboxMail[];
    const text = (to: string) => mails.find((mail) => mail.to === to)?.text;
    expect(text('named@example.org')).toContain('secret-token');
    expect(text('masked@example.org')).toBeNull();
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
