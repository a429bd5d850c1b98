import { limits } from '@stillroom/shared/protocol';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildPerson, signIn } from '../support/build.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

const policy = (headers: Headers): string => headers.get('content-security-policy') ?? '';

describe('the content policy', () => {
  test('is the tight one, on pages and answers alike', async () => {
    const visitor = new Visitor(server.url);
    for (const path of ['/', '/sign-in', '/api/session', '/api/nowhere']) {
      const { headers } = await visitor.get(path);
      const nonce = /'nonce-([^']+)'/u.exec(policy(headers))?.[1];
      expect(policy(headers), path).toBe(
        "default-src 'none'; script-src 'self' 'wasm-unsafe-eval'; " +
          `style-src 'self' 'nonce-${nonce}'; img-src 'self' data:; font-src 'self'; ` +
          "connect-src 'self'; worker-src 'self'; base-uri 'none'; form-action 'self'; frame-ancestors 'none'",
      );
    }
  });

  test('has a fresh nonce each time, and pages are never stored', async () => {
    const visitor = new Visitor(server.url);
    const [first, second] = [await visitor.get('/'), await visitor.get('/')];
    expect(policy(first.headers)).not.toBe(policy(second.headers));
    expect(first.headers.get('cache-control')).toBe('no-store');
    expect(first.headers.get('x-content-type-options')).toBe('nosniff');
    expect(first.headers.get('x-powered-by')).toBeNull();
  });
});

describe('requests from elsewhere', () => {
  test.each([
    ['another site', { origin: 'https://elsewhere.example' }],
    ['a page without an origin', { origin: 'null' }],
    ['the same name on another port', { origin: 'http://127.0.0.1:1' }],
  ])('%s cannot change anything with our cookie', async (_who, headers) => {
    const visitor = await signIn(server, await buildPerson(server));
    const answer = await visitor.send('POST', '/api/groups', { name: 'Not mine' }, headers);
    expect(answer.status).toBe(403);
    expect(answer.body).toMatchObject({
      error: 'forbidden',
      hint: expect.stringContaining('Reload') as string,
    });
    expect((await visitor.get('/api/groups')).body).toEqual([]);
  });
});

describe('what cannot be read', () => {
  test('a character that cannot be kept is refused in words', async () => {
    const visitor = await signIn(server, await buildPerson(server));
    const answer = await visitor.post('/api/groups', { name: 'a\u0000b' });
    expect([answer.status, answer.body]).toMatchObject([400, { error: 'invalid' }]);
  });

  test('broken JSON, a wrong type and too much of it are refused in words', async () => {
    const visitor = await signIn(server, await buildPerson(server));
    const json = { 'content-type': 'application/json' };
    const send = (body: string) =>
      fetch(`${server.url}/api/groups`, {
        method: 'POST',
        headers: { ...json, origin: server.url, cookie: visitor.cookie ?? '' },
        body,
      });
    const broken = await send('{"name": ');
    expect([broken.status, await broken.json()]).toMatchObject([400, { error: 'invalid' }]);
    const wrong = await visitor.post('/api/groups', { name: 7 });
    expect(wrong).toMatchObject({
      status: 400,
      body: { error: 'invalid', fields: { name: expect.any(String) as string } },
    });
    const blank = await visitor.post('/api/groups', { name: '   ' });
    expect(blank.body).toMatchObject({ message: 'A title is needed.' });
    const large = await send(JSON.stringify({ name: 'x'.repeat(2_000_000) }));
    expect([large.status, await large.json()]).toMatchObject([413, { error: 'too-large' }]);
  });

  test('of somebody who is not signed in, nothing is read where an account is needed, and little elsewhere', async () => {
    const send = (method: string, path: string, body: string) =>
      fetch(`${server.url}${path}`, {
        method,
        headers: { 'content-type': 'application/json', origin: server.url },
        body,
      });
    const needsAccount = await send('POST', '/api/groups', '{"name": not even JSON');
    expect([needsAccount.status, await needsAccount.json()]).toMatchObject([401, { error: 'signed-out' }]);
    const long = JSON.stringify({ email: 'a@example.org', password: 'x'.repeat(limits.strangersBody) });
    const large = await send('POST', '/api/session', long);
    expect([large.status, await large.json()]).toMatchObject([
      413,
      { error: 'too-large', hint: expect.any(String) as string },
    ]);
    // The longest verdict that the form takes still comes through the door of a link: only the link is unknown.
    const verdict = {
      recommendation: 'take',
      toAuthors: 'ü'.repeat(20_000),
      toEditor: '水'.repeat(20_000),
      claims: {},
    };
    const judged = await send('PUT', `/api/review/${'x'.repeat(43)}/verdict`, JSON.stringify(verdict));
    expect(judged.status).toBe(410);
  });

  test('an address that is no id is refused before the database sees it', async () => {
    const visitor = await signIn(server, await buildPerson(server));
    const { status, body } = await visitor.get("/api/groups/1'; drop table person");
    expect([status, body]).toMatchObject([400, { error: 'invalid' }]);
  });

  test('an unknown address below /api is answered in JSON, not with the page', async () => {
    const { status, body } = await new Visitor(server.url).get('/api/nowhere');
    expect([status, body]).toMatchObject([404, { error: 'not-found' }]);
  });
});

describe('too many requests', () => {
  test('are refused with the time to wait, for one person and not for others', async () => {
    // 240 writes a minute, times 0.02: four.
    const strict = await startTestServer({ RATE_FACTOR: '0.02' });
    try {
      const [eager, other] = await Promise.all([buildPerson(strict), buildPerson(strict)]);
      const [first, second] = [
        await new Visitor(strict.url).get('/api/session'),
        await signIn(strict, eager),
      ];
      expect(first.status).toBe(200);
      const statuses: number[] = [];
      for (let count = 0; count < 7; count += 1) {
        const { status } = await second.post('/api/groups', { name: `Group ${count}` });
        statuses.push(status);
      }
      expect(statuses.slice(-2)).toEqual([429, 429]);
      const refused = await second.post('/api/groups', { name: 'One more' });
      expect(refused.body).toMatchObject({
        error: 'too-many',
        hint: expect.stringMatching(/^Wait \d+ seconds/u) as string,
      });
      expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(0);
      expect(other.id).not.toBe(eager.id);
    } finally {
      await strict.stop();
    }
  });
});

describe('an error nobody foresaw', () => {
  test('is hidden behind a number that the log knows', async () => {
    const visitor = await signIn(server, await buildPerson(server));
    await server.sql('alter table work_group rename to away');
    try {
      const { status, body } = await visitor.get('/api/groups');
      expect(status).toBe(500);
      const { hint } = body as { hint: string };
      const number = /[0-9a-f]{8}/u.exec(hint)?.[0] ?? 'none';
      expect(JSON.stringify(body)).not.toMatch(/work_group|select/iu);
      expect(server.log.some((line) => line.includes(number) && line.includes('work_group'))).toBe(true);
    } finally {
      await server.sql('alter table away rename to work_group');
    }
  });
});
