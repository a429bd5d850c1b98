import type { AccountView, OutboxMail, SessionView, ShownLetter } from '@stillroom/shared/contracts';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { buildPerson, signIn, usualPassword } from '../support/build.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

let server: TestServer;
let operator: Visitor;
beforeAll(async () => {
  server = await startTestServer();
  operator = await signIn(server, await buildPerson(server, { operator: true }));
});
afterAll(() => server.stop());

/** The newest letter to an address, out of the outbox; shown on request where its link opens something. */
async function letterTo(address: string): Promise<Pick<OutboxMail, 'subject' | 'text'> | undefined> {
  const { body } = await operator.get('/api/operator/outbox');
  const mail = (body as OutboxMail[]).find(({ to }) => to === address);
  if (mail?.sealed !== 'on request') return mail;
  return (await operator.post(`/api/operator/outbox/${mail.id}/showing`)).body as ShownLetter;
}

async function tokenIn(address: string, page: string): Promise<string> {
  const letter = await letterTo(address);
  return new RegExp(`/${page}/([\\w-]+)`, 'u').exec(letter?.text ?? '')?.[1] ?? 'no token';
}

const setSignUp = (signUp: 'open' | 'invitation') => operator.patch('/api/operator/settings', { signUp });
const newcomer = (email: string) => ({ email, name: 'New Comer', password: usualPassword });

describe('opening an account', () => {
  beforeEach(() => setSignUp('open'));

  test('goes over a letter: only its link lets the newcomer in', async () => {
    const visitor = new Visitor(server.url);
    expect((await visitor.post('/api/accounts', newcomer('new@example.org'))).status).toBe(202);
    const early = await visitor.post('/api/session', { email: 'new@example.org', password: usualPassword });
    expect(early.body).toMatchObject({ error: 'unconfirmed' });
    const token = await tokenIn('new@example.org', 'confirm');
    const { status, body } = await visitor.post('/api/accounts/confirm', { token });
    expect([status, body]).toMatchObject([200, { email: 'new@example.org', initials: 'NC' }]);
    expect(((await visitor.get('/api/session')).body as SessionView).me?.email).toBe('new@example.org');
    const again = await visitor.post('/api/accounts/confirm', { token });
    expect([again.status, again.body]).toMatchObject([
      410,
      { message: expect.stringContaining('works once') as string },
    ]);
  });

  test('does not tell a stranger whether an address has an account; its owner is told', async () => {
    await buildPerson(server, { email: 'known@example.org' });
    const visitor = new Visitor(server.url);
    const known = await visitor.post('/api/accounts', newcomer('known@example.org'));
    const unknown = await visitor.post('/api/accounts', newcomer('unknown@example.org'));
    expect([known.status, known.body]).toEqual([unknown.status, unknown.body]);
    expect((await letterTo('known@example.org'))?.subject).toBe('You already have a Stillroom account');
  });

  test('is refused with words for each field', async () => {
    const { status, body } = await new Visitor(server.url).post('/api/accounts', {
      email: 'no address',
      name: '',
      password: 'short',
    });
    expect(status).toBe(400);
    expect(Object.keys((body as { fields: object }).fields).sort()).toEqual(['email', 'name', 'password']);
  });

  test('needs an invitation where the operator wants that', async () => {
    await setSignUp('invitation');
    const visitor = new Visitor(server.url);
    const { status, body } = await visitor.post('/api/accounts', newcomer('uninvited@example.org'));
    expect([status, body]).toMatchObject([
      403,
      { error: 'forbidden', hint: expect.stringContaining('lead') as string },
    ]);
    expect(await letterTo('uninvited@example.org')).toBeUndefined();
  });
});

describe('a forgotten password', () => {
  test('is set anew by a link that works once and ends all sessions', async () => {
    const person = await buildPerson(server);
    const elsewhere = await signIn(server, person);
    const visitor = new Visitor(server.url);
    expect((await visitor.post('/api/password-resets', { email: person.email })).status).toBe(202);
    const token = await tokenIn(person.email, 'new-password');
    const change = { token, password: 'another password' };
    expect((await visitor.put('/api/password-resets', change)).status).toBe(204);
    expect((await elsewhere.get('/api/account')).status).toBe(401);
    const old = await visitor.post('/api/session', { email: person.email, password: usualPassword });
    expect(old.status).toBe(401);
    const fresh = await visitor.post('/api/session', { email: person.email, password: 'another password' });
    expect(fresh.status).toBe(200);
    expect((await visitor.put('/api/password-resets', change)).status).toBe(410);
    expect((await letterTo(person.email))?.subject).toBe('Your Stillroom password was changed');
  });

  test('asked for an unknown address is answered the same and sends nothing', async () => {
    const { status } = await new Visitor(server.url).post('/api/password-resets', {
      email: 'none@example.org',
    });
    expect(status).toBe(202);
    expect(await letterTo('none@example.org')).toBeUndefined();
  });

  test('a newer letter makes the older link void, and links run out', async () => {
    const person = await buildPerson(server);
    const visitor = new Visitor(server.url);
    await visitor.post('/api/password-resets', { email: person.email });
    const older = await tokenIn(person.email, 'new-password');
    await visitor.post('/api/password-resets', { email: person.email });
    const newer = await tokenIn(person.email, 'new-password');
    const put = (token: string) =>
      visitor.put('/api/password-resets', { token, password: 'yet another one' });
    expect((await put(older)).status).toBe(410);
    await server.sql(`update account_token set until = now() - interval '1 minute' where person = $1`, [
      person.id,
    ]);
    const late = await put(newer);
    expect([late.status, late.body]).toMatchObject([
      410,
      { message: expect.stringContaining('run out') as string },
    ]);
  });

  test('no token is kept as it is sent', async () => {
    const person = await buildPerson(server);
    await new Visitor(server.url).post('/api/password-resets', { email: person.email });
    const token = await tokenIn(person.email, 'new-password');
    const rows = await server.sql<{ digest: string }>('select digest from account_token');
    expect(rows.map(({ digest }) => digest)).not.toContain(token);
  });
});

describe('one’s own account', () => {
  test('shows sessions, and signs out everywhere else', async () => {
    const person = await buildPerson(server);
    const [here, there] = [await signIn(server, person), await signIn(server, person)];
    const { sessions } = (await here.get('/api/account')).body as AccountView;
    expect(sessions).toHaveLength(2);
    expect(sessions.filter(({ current }) => current)).toHaveLength(1);
    expect((await here.delete('/api/account/sessions')).status).toBe(204);
    expect((await here.get('/api/account')).status).toBe(200);
    expect((await there.get('/api/account')).status).toBe(401);
  });

  test('ends one session by its name; nobody else can', async () => {
    const person = await buildPerson(server);
    const [here, there] = [await signIn(server, person), await signIn(server, person)];
    const stranger = await signIn(server, await buildPerson(server));
    const { sessions } = (await here.get('/api/account')).body as AccountView;
    const other = sessions.find(({ current }) => !current)?.id ?? '';
    expect((await stranger.delete(`/api/account/sessions/${other}`)).status).toBe(404);
    expect((await here.delete(`/api/account/sessions/${other}`)).status).toBe(204);
    expect((await there.get('/api/account')).status).toBe(401);
  });

  test('changes the name, and the password only with the present one', async () => {
    const person = await buildPerson(server);
    const [here, there] = [await signIn(server, person), await signIn(server, person)];
    const named = await here.patch('/api/account', { name: 'Quite Another' });
    expect(named.body).toMatchObject({ name: 'Quite Another', initials: 'QA' });
    const change = (current: string) =>
      here.patch('/api/account', { password: { current, next: 'a fresh password' } });
    const wrong = await change('not this');
    expect(wrong).toMatchObject({
      status: 400,
      body: { fields: { 'password.current': expect.any(String) as string } },
    });
    expect((await there.get('/api/account')).status).toBe(200);
    expect((await change(usualPassword)).status).toBe(200);
    expect((await here.get('/api/account')).status).toBe(200);
    expect((await there.get('/api/account')).status).toBe(401);
  });
});

describe('guessing passwords', () => {
  test('is slowed down after five failures, also for the right password, until the pause is over', async () => {
    const person = await buildPerson(server);
    const visitor = new Visitor(server.url);
    const guess = (password: string) => visitor.post('/api/session', { email: person.email, password });
    for (let count = 0; count < 5; count += 1) expect((await guess(`wrong ${count}`)).status).toBe(401);
    const refused = await guess(usualPassword);
    expect([refused.status, refused.body]).toMatchObject([
      429,
      { error: 'too-many', hint: expect.stringMatching(/Wait \d+ seconds/u) as string },
    ]);
    await server.sql(`update password_guess set last_at = now() - interval '1 minute'`);
    expect((await guess(usualPassword)).status).toBe(200);
    expect((await guess('wrong again')).status).toBe(401);
  });

  test('does not keep others out', async () => {
    const [victim, other] = await Promise.all([buildPerson(server), buildPerson(server)]);
    const visitor = new Visitor(server.url);
    for (let count = 0; count < 6; count += 1) {
      await visitor.post('/api/session', { email: victim.email, password: 'wrong' });
    }
    await expect(signIn(server, other)).resolves.toBeDefined();
  });
});
