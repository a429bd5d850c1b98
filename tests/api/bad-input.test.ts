import type { AccountView, FairCopy, Me, SessionView } from '@stillroom/shared/contracts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildGroup, buildPerson, signIn, usualPassword } from '../support/build.ts';
import { buildNotebook } from '../support/live.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

/*
 * What goes wrong between people, at the server's door: each is told in clear words, and nothing is lost. Names of cells
 * and what is typed are in tests/live/bad-input.test.ts, the pages in tests/browser/bad-input.test.ts.
 */

let server: TestServer;
let ada: Me;
let asAda: Visitor;
let group: { readonly id: string };
beforeAll(async () => {
  server = await startTestServer();
  ada = await buildPerson(server, { email: 'ada@example.org', operator: true });
  asAda = await signIn(server, ada);
  group = await buildGroup(server, ada);
  await asAda.patch('/api/operator/settings', { signUp: 'open' });
});
afterAll(() => server.stop());

const tokenTo = async (email: string, page: string) => {
  const [mail] = await server.sql<{ text: string }>(
    'select text from mail where recipient = $1 order by at desc limit 1',
    [email],
  );
  return new RegExp(`/${page}/([\\w-]+)`, 'u').exec(mail?.text ?? '')?.[1] ?? 'none';
};

describe('names taken', () => {
  test('two people who open an account with one address at once: one account, and no failure without words', async () => {
    const asked = { email: 'twice@example.org', name: 'Twice', password: usualPassword };
    const answers = await Promise.all(
      [1, 2, 3].map(() => new Visitor(server.url).post('/api/accounts', asked)),
    );
    for (const { status, body } of answers) {
      expect([202, 409]).toContain(status);
      if (status === 409)
        expect(body).toMatchObject({ error: 'conflict', hint: expect.any(String) as string });
    }
    expect(answers.some(({ status }) => status === 202)).toBe(true);
    expect(await server.sql(`select 1 from person where email = 'twice@example.org'`)).toHaveLength(1);
  });

  test('two groups and two notebooks may bear one name: they are told apart by what is in them', async () => {
    const first = await asAda.post('/api/groups', { name: 'Same' });
    const second = await asAda.post('/api/groups', { name: 'Same' });
    expect([first.status, second.status]).toEqual([201, 201]);
    const titles = [1, 2].map(() => asAda.post(`/api/groups/${group.id}/notebooks`, { title: 'Same' }));
    expect((await Promise.all(titles)).map(({ status }) => status)).toEqual([201, 201]);
  });
});

describe('changed by two people at once', () => {
  test('a group that two leads rename bears one of the two names, and the trail has both', async () => {
    const names = ['From the left', 'From the right'];
    await Promise.all(names.map((name) => asAda.patch(`/api/groups/${group.id}`, { name })));
    const { body } = await asAda.get(`/api/groups/${group.id}`);
    expect(names).toContain((body as { name: string }).name);
    const { body: trail } = await asAda.get(`/api/groups/${group.id}/audit`);
    for (const name of names) expect(JSON.stringify(trail)).toContain(name);
  });

  test('a notebook that is put away and taken out by two at once is in one state, and each is told', async () => {
    const notebook = await buildNotebook(server, group, ada);
    const away = await Promise.all([1, 2].map(() => asAda.delete(`/api/notebooks/${notebook}`)));
    expect(away.map(({ status }) => status).sort()).toEqual(expect.arrayContaining([204]));
    for (const { status } of away) expect([204, 410]).toContain(status);
    const back = await Promise.all([1, 2].map(() => asAda.post(`/api/notebooks/${notebook}/restore`)));
    for (const { status } of back) expect([204, 409]).toContain(status);
    expect((await asAda.get(`/api/notebooks/${notebook}`)).status).toBe(200);
  });
});

describe('a link opened while signed in as someone else', () => {
  test('of an account to be confirmed says so, is not used up, and leaves the session as it was', async () => {
    const asked = { email: 'new@example.org', name: 'New', password: usualPassword };
    await new Visitor(server.url).post('/api/accounts', asked);
    const token = await tokenTo('new@example.org', 'confirm');
    const { status, body } = await asAda.post('/api/accounts/confirm', { token });
    expect([status, body]).toMatchObject([
      409,
      {
        message: 'This link is for new@example.org; you are signed in as ada@example.org.',
        hint: expect.stringContaining('Sign out') as string,
      },
    ]);
    expect(((await asAda.get('/api/session')).body as SessionView).me?.id).toBe(ada.id);
    const later = await new Visitor(server.url).post('/api/accounts/confirm', { token });
    expect(later.status).toBe(200);
  });

  test('of a new password sets that of its reader and leaves the session as it was', async () => {
    const ben = await buildPerson(server, { email: 'ben@example.org' });
    await new Visitor(server.url).post('/api/password-resets', { email: ben.email });
    const token = await tokenTo(ben.email, 'new-password');
    const password = 'another long password';
    expect((await asAda.send('PUT', '/api/password-resets', { token, password })).status).toBe(204);
    expect(((await asAda.get('/api/account')).body as AccountView).email).toBe(ada.email);
    const benAgain = await new Visitor(server.url).post('/api/session', { email: ben.email, password });
    expect(benAgain.status).toBe(200);
    expect((await new Visitor(server.url).post('/api/session', { email: ada.email, password })).status).toBe(
      401,
    );
  });
});

describe('uploads that are not what they claim', () => {
  const upload = (notebook: string, bytes: BlobPart, name: string, type: string) => {
    const form = new FormData();
    form.set('picture', new Blob([bytes], { type }), name);
    return asAda.post(`/api/notebooks/${notebook}/pictures`, form);
  };

  test.each([
    ['a page called a picture', '<!doctype html><script>1</script>', 'curve.png', 'image/png'],
    [
      'a drawing with a script',
      '<svg xmlns="http://www.w3.org/2000/svg"><script/></svg>',
      'a.svg',
      'image/svg+xml',
    ],
    ['a program', '\u007fELF\u0002\u0001', 'a.jpg', 'image/jpeg'],
    ['nothing', '', 'a.png', 'image/png'],
  ])('%s is refused with what is taken', async (_what, bytes, name, type) => {
    const notebook = await buildNotebook(server, group, ada);
    const { status, body } = await upload(notebook, bytes, name, type);
    expect([status, body]).toMatchObject([400, { hint: expect.stringContaining('PNG') as string }]);
    expect(await server.sql('select 1 from picture_place where place = $1', [notebook])).toEqual([]);
  });

  test('one that is too large is refused with its bound', async () => {
    const notebook = await buildNotebook(server, group, ada);
    const { status, body } = await upload(notebook, new Uint8Array(6 * 1024 * 1024), 'a.png', 'image/png');
    expect([status, body]).toMatchObject([413, { error: 'too-large', hint: expect.any(String) as string }]);
  });

  test.each([
    ['an archive', 'PK\u0003\u0004'],
    ['a list', '[]'],
    ['another program’s file', '{"cells":[],"nbformat":4}'],
    ['half a file', '{"format":"stillroom-notebook/1","cells":['],
  ])('%s called a notebook file makes nothing', async (_what, text) => {
    const before = await server.sql('select count(*) from notebook');
    const answer = await fetch(`${server.url}/api/groups/${group.id}/notebook-files`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', origin: server.url, cookie: asAda.cookie ?? '' },
      body: text,
    });
    expect([answer.status, await answer.json()]).toMatchObject([
      400,
      { message: expect.stringMatching(/\.$/u) as string },
    ]);
    expect(await server.sql('select count(*) from notebook')).toEqual(before);
  });
});

describe('a notebook file edited by hand', () => {
  const cell = { id: 'c1', kind: 'network', name: 'yeast', text: 'A -> B', settings: {}, held: false };
  const file = (change: object) => ({
    format: 'stillroom-notebook/1',
    title: 'T',
    subject: 'none',
    cells: [cell],
    ...change,
  });
  test.each([
    ['a key that does not belong', file({ colour: 'red' }), /colour/u],
    ['a kind that there is not', file({ cells: [{ ...cell, kind: 'oracle' }] }), /kind|oracle/u],
    ['two cells of one id', file({ cells: [cell, { ...cell, name: 'other' }] }), /c1/u],
    ['a text that is none', file({ cells: [{ ...cell, text: 5 }] }), /text/u],
    ['two cells of one name', file({ cells: [cell, { ...cell, id: 'c2' }] }), /yeast/u],
  ])('%s is refused and named', async (_what, body, named) => {
    const { status, body: said } = await asAda.post(`/api/groups/${group.id}/notebook-files`, body);
    expect(status, JSON.stringify(said)).toBe(400);
    expect((said as { message: string }).message).toMatch(named);
  });

  test('a network that cannot be read, and a setting that does not belong, come in and say so themselves', async () => {
    const cells = [
      { ...cell, text: 'A -> B\nA -' },
      { ...cell, id: 'c2', name: 'odd', settings: { speed: 9 } },
      { ...cell, id: 'c3', name: 'well' },
    ];
    const { status, body } = await asAda.post(`/api/groups/${group.id}/notebook-files`, file({ cells }));
    expect(status).toBe(201);
    const { id } = body as { id: string };
    await expect
      .poll(async () => {
        const copy = (await asAda.get(`/api/notebooks/${id}/fair-copy`)).body as FairCopy;
        return copy.cells.map(({ state, error }) => [state, error?.line ?? error?.message ?? null]);
      })
      .toEqual([
        ['failed', 2],
        ['failed', expect.stringContaining('speed')],
        ['current', null],
      ]);
  });
});
