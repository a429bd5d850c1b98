import type { Me, SessionView } from '@stillroom/shared/contracts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildPerson, signIn, usualPassword } from '../support/build.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

let server: TestServer;
let person: Me;
beforeAll(async () => {
  server = await startTestServer();
  person = await buildPerson(server, { email: 'ada@example.org', name: 'Ada Quillane' });
});
afterAll(() => server.stop());

describe('signing in', () => {
  test('works for more people at once than the database has connections', async () => {
    const small = await startTestServer({ DATABASE_POOL: '4' });
    try {
      const { email } = await buildPerson(small);
      const answers = await Promise.all(
        Array.from({ length: 12 }, () =>
          new Visitor(small.url).post('/api/session', { email, password: usualPassword }),
        ),
      );
      expect(answers.map(({ status }) => status)).toEqual(answers.map(() => 200));
    } finally {
      await small.stop();
    }
  });

  test('the right password opens a session, in capitals and blanks too', async () => {
    const visitor = new Visitor(server.url);
    const answer = await visitor.post('/api/session', {
      email: ' Ada@Example.org ',
      password: usualPassword,
    });
    expect(answer.status).toBe(200);
    expect(answer.body).toEqual({
      id: person.id,
      name: 'Ada Quillane',
      email: 'ada@example.org',
      initials: 'AQ',
      hue: person.hue,
      operator: false,
    });
    const { body } = await visitor.get('/api/session');
    expect((body as SessionView).me?.id).toBe(person.id);
  });

  test('a wrong password and an unknown address are refused in the same words', async () => {
    const visitor = new Visitor(server.url);
    const wrong = await visitor.post('/api/session', { email: person.email, password: 'not this one' });
    const unknown = await visitor.post('/api/session', {
      email: 'nobody@example.org',
      password: 'not this one',
    });
    expect(wrong.status).toBe(401);
    expect(wrong.body).toMatchObject({ error: 'wrong-password' });
    expect(unknown.body).toEqual(wrong.body);
    expect(visitor.cookie).toBeNull();
  });

  test('a session planted before signing in is worth nothing afterwards', async () => {
    const visitor = await signIn(server, person);
    const before = visitor.cookie;
    await visitor.post('/api/session', { email: person.email, password: usualPassword });
    expect(visitor.cookie).not.toBe(before);
    const old = new Visitor(server.url);
    const { body } = await old.send('GET', '/api/session', undefined, { cookie: before ?? '' });
    expect((body as SessionView).me).toBeNull();
  });

  test('the cookie cannot be read by script or sent by another site', async () => {
    const visitor = new Visitor(server.url);
    const { headers } = await visitor.post('/api/session', { email: person.email, password: usualPassword });
    expect(headers.getSetCookie().join()).toMatch(/HttpOnly; SameSite=Lax/u);
  });

  test('an address that is not confirmed stays outside and is told what to do', async () => {
    const stranger = await buildPerson(server, { confirmed: false });
    const visitor = new Visitor(server.url);
    const answer = await visitor.post('/api/session', { email: stranger.email, password: usualPassword });
    expect(answer.status).toBe(403);
    expect(answer.body).toMatchObject({ error: 'unconfirmed' });
  });
});

describe('signing out', () => {
  test('ends the session for good', async () => {
    const visitor = await signIn(server, person);
    const cookie = visitor.cookie ?? '';
    expect((await visitor.delete('/api/session')).status).toBe(204);
    const { status } = await visitor.send('GET', '/api/account', undefined, { cookie });
    expect(status).toBe(401);
  });
});
