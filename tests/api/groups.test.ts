import type {
  AuditPage,
  GroupSummary,
  GroupView,
  InvitationCard,
  Me,
  OutboxMail,
} from '@stillroom/shared/contracts';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { buildGroup, buildMember, buildPerson, signIn, usualPassword } from '../support/build.ts';
import { buildNotebook } from '../support/live.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

let server: TestServer;
let lead: Me;
let leading: Visitor;
let group: { readonly id: string };
beforeAll(async () => {
  server = await startTestServer();
  lead = await buildPerson(server, { name: 'Lena Ad' });
  leading = await signIn(server, lead);
});
afterAll(() => server.stop());
beforeEach(async () => {
  group = await buildGroup(server, lead);
});

const at = (path = '') => `/api/groups/${group.id}${path}`;
const invitation = (email: string, more: object = {}) => ({
  email,
  role: 'author',
  notebooks: null,
  message: 'Welcome.\nStart with the assay.',
  ...more,
});

async function lettersTo(address: string): Promise<OutboxMail[]> {
  const rows = await server.sql<{ text: string; subject: string; html: string }>(
    'select * from mail where recipient = $1 order by at desc',
    [address],
  );
  return rows as unknown as OutboxMail[];
}

async function linkTo(address: string): Promise<string> {
  const [letter] = await lettersTo(address);
  return /\/invitation\/([\w-]+)/u.exec(letter?.text ?? '')?.[1] ?? 'no link';
}

const trail = async (): Promise<string[]> =>
  ((await leading.get(at('/audit'))).body as AuditPage).entries.map(
    ({ by, words }) => `${by?.name ?? ''} ${words}`,
  );

describe('inviting', () => {
  test('someone with an account joins by the link, and the trail knows', async () => {
    const person = await buildPerson(server, { name: 'Jo Iner' });
    const sent = await leading.post(at('/invitations'), invitation(person.email));
    expect([sent.status, sent.body]).toMatchObject([
      201,
      { email: person.email, role: 'author', by: { name: 'Lena Ad' } },
    ]);
    const [letter] = await lettersTo(person.email);
    expect(letter?.text).toContain('> Start with the assay.');
    const visitor = await signIn(server, person);
    const link = await linkTo(person.email);
    const card = (await visitor.get(`/api/invitations/${link}`)).body as InvitationCard;
    expect(card).toMatchObject({ group: 'Kinetics', role: 'author', by: 'Lena Ad', known: true });
    const joined = await visitor.post(`/api/invitations/${link}`);
    expect(joined.body).toMatchObject({ id: group.id, role: 'author', members: 2 });
    expect((await trail()).slice(0, 2)).toEqual([
      'Jo Iner joined as an author',
      `Lena Ad invited ${person.email} as an author`,
    ]);
    const again = await visitor.post(`/api/invitations/${link}`);
    expect([again.status, again.body]).toMatchObject([
      410,
      { message: expect.stringContaining('used already') as string },
    ]);
  });

  test('someone without an account signs up with the link, also where sign-up is closed', async () => {
    await leading.post(at('/invitations'), invitation('fresh@example.org', { role: 'reader' }));
    const link = await linkTo('fresh@example.org');
    const visitor = new Visitor(server.url);
    expect((await visitor.get(`/api/invitations/${link}`)).body).toMatchObject({ known: false });
    const signUp = { name: 'Fresh Face', password: usualPassword, invitation: link };
    const other = await visitor.post('/api/accounts', { ...signUp, email: 'other@example.org' });
    expect([other.status, other.body]).toMatchObject([
      400,
      { fields: { email: expect.stringContaining('fresh@example.org') as string } },
    ]);
    expect((await visitor.post('/api/accounts', { ...signUp, email: 'fresh@example.org' })).status).toBe(201);
    expect((await visitor.post(`/api/invitations/${link}`)).body).toMatchObject({ role: 'reader' });
  });

  test('a link opened while signed in as someone else says so and is not used up', async () => {
    await leading.post(at('/invitations'), invitation('meant@example.org'));
    const link = await linkTo('meant@example.org');
    const stranger = await buildPerson(server);
    const visitor = await signIn(server, stranger);
    const { status, body } = await visitor.post(`/api/invitations/${link}`);
    expect(status).toBe(409);
    expect((body as { message: string }).message).toContain(
      'sent to meant@example.org; you are signed in as',
    );
    expect((await visitor.get(`/api/invitations/${link}`)).status).toBe(200);
  });

  test('a withdrawn, a replaced and an expired link are told apart from an unknown one', async () => {
    const visitor = new Visitor(server.url);
    const message = async (link: string) =>
      ((await visitor.get(`/api/invitations/${link}`)).body as { message: string }).message;
    const first = (await leading.post(at('/invitations'), invitation('w@example.org'))).body as {
      id: string;
    };
    const withdrawn = await linkTo('w@example.org');
    expect((await leading.delete(at(`/invitations/${first.id}`))).status).toBe(204);
    expect(await message(withdrawn)).toContain('withdrawn');
    await leading.post(at('/invitations'), invitation('r@example.org'));
    const replaced = await linkTo('r@example.org');
    await leading.post(at('/invitations'), invitation('r@example.org'));
    expect(await message(replaced)).toContain('newer one');
    const last = await linkTo('r@example.org');
    await server.sql(`update invitation set until = now() - interval '1 day' where email = 'r@example.org'`);
    expect(await message(last)).toContain('run out');
    expect(await message('unheard-of')).toContain('does not exist');
  });

  test('a member cannot be invited again', async () => {
    const { status, body } = await leading.post(at('/invitations'), invitation(lead.email));
    expect([status, body]).toMatchObject([409, { error: 'conflict' }]);
  });
});

describe('members', () => {
  test('a change of role takes effect at once and is announced to open connections', async () => {
    const person = await buildPerson(server);
    await buildMember(server, group, person, 'author');
    const heard = new Promise((resolve) => server.services.events.on('access.changed', resolve));
    const change = { role: 'reader', notebooks: null };
    const { body } = await leading.patch(at(`/members/${person.id}`), change);
    expect((body as GroupView).members.find(({ id }) => id === person.id)?.role).toBe('reader');
    expect(await heard).toEqual({ person: person.id, group: group.id });
    expect((await trail())[0]).toBe(`Lena Ad changed ${person.name} from an author to a reader`);
  });

  test('a removed member is outside at once', async () => {
    const person = await buildPerson(server);
    await buildMember(server, group, person, 'author');
    const visitor = await signIn(server, person);
    expect((await visitor.get(at())).status).toBe(200);
    expect((await leading.delete(at(`/members/${person.id}`))).status).toBe(200);
    expect((await visitor.get(at())).status).toBe(404);
    expect((await visitor.get('/api/groups')).body).toEqual([]);
  });

  test('anybody may leave but the last lead, who may not step down either', async () => {
    const person = await buildPerson(server);
    await buildMember(server, group, person, 'reader');
    const visitor = await signIn(server, person);
    expect((await visitor.delete(at(`/members/${person.id}`))).status).toBe(204);
    const leaves = await leading.delete(at(`/members/${lead.id}`));
    expect([leaves.status, leaves.body]).toMatchObject([
      409,
      { hint: expect.stringContaining('hand the group over') as string },
    ]);
    const down = await leading.patch(at(`/members/${lead.id}`), { role: 'author', notebooks: null });
    expect(down.status).toBe(409);
  });

  test('two leads who leave at the same moment do not leave the group without one', async () => {
    const second = await buildPerson(server);
    await buildMember(server, group, second, 'lead');
    const visitor = await signIn(server, second);
    const answers = await Promise.all([
      leading.delete(at(`/members/${lead.id}`)),
      visitor.delete(at(`/members/${second.id}`)),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([204, 409]);
  });

  test('a group is handed over to a member, who then leads alone', async () => {
    const person = await buildPerson(server, { name: 'Su Ccessor' });
    await buildMember(server, group, person, 'author');
    const { body } = await leading.post(at('/hand-over'), { to: person.id });
    const roles = (body as GroupView).members.map(({ id, role }) => [id, role]);
    expect(roles).toEqual([
      [person.id, 'lead'],
      [lead.id, 'author'],
    ]);
    expect((await leading.post(at('/hand-over'), { to: lead.id })).status).toBe(403);
  });

  test('hand-over needs a member other than oneself', async () => {
    const stranger = await buildPerson(server);
    expect((await leading.post(at('/hand-over'), { to: stranger.id })).status).toBe(404);
    expect((await leading.post(at('/hand-over'), { to: lead.id })).status).toBe(409);
  });
});

describe('a group', () => {
  test('is opened by anybody, who leads it', async () => {
    const visitor = await signIn(server, await buildPerson(server));
    const { status, body } = await visitor.post('/api/groups', { name: ' Ring and Chain ' });
    expect([status, body]).toMatchObject([201, { name: 'Ring and Chain', role: 'lead', members: 1 }]);
    const groups = (await visitor.get('/api/groups')).body as GroupSummary[];
    expect(groups.map(({ name }) => name)).toEqual(['Ring and Chain']);
  });

  test('names a notebook in the bin only to those who can take it out', async () => {
    const reader = await buildPerson(server);
    await buildMember(server, group, reader, 'reader');
    const author = await buildPerson(server);
    await buildMember(server, group, author, 'author');
    const notebook = await buildNotebook(server, group, lead, [], { title: 'Thrown away' });
    await leading.delete(`/api/notebooks/${notebook}`);
    const titles = async (visitor: Visitor) =>
      ((await visitor.get(at())).body as GroupView).notebooks.map(({ title }) => title);
    expect(await titles(leading)).toEqual(['Thrown away']);
    expect(await titles(await signIn(server, author))).toEqual([]);
    expect(await titles(await signIn(server, reader))).toEqual([]);
  });

  test('shows open invitations to those who may invite, and to nobody else', async () => {
    const person = await buildPerson(server);
    await buildMember(server, group, person, 'author');
    await leading.post(at('/invitations'), invitation('guest@example.org'));
    const own = (await leading.get(at())).body as GroupView;
    const theirs = (await (await signIn(server, person)).get(at())).body as GroupView;
    expect(own.invitations.map(({ email }) => email)).toEqual(['guest@example.org']);
    expect(theirs.invitations).toEqual([]);
    expect(own.abilities).toContain('group.invite');
    expect(theirs.abilities).not.toContain('group.invite');
  });

  test('keeps its trail page by page, and as CSV that no spreadsheet runs', async () => {
    for (let count = 0; count < 55; count += 1) await leading.patch(at(), { name: `Name ${count}` });
    await leading.patch(at(), { name: '=HYPERLINK("x"), "quoted"' });
    const first = (await leading.get(at('/audit'))).body as AuditPage;
    expect([first.entries.length, first.more]).toEqual([50, true]);
    const second = (await leading.get(at(`/audit?before=${first.entries.at(-1)?.id}`))).body as AuditPage;
    expect([second.entries.length, second.more]).toEqual([7, false]);
    const { body, headers } = await leading.get(at('/audit.csv'));
    expect(headers.get('content-type')).toContain('text/csv');
    expect(headers.get('content-disposition')).toContain('attachment');
    const lines = String(body).trimEnd().split('\r\n');
    expect(lines).toHaveLength(58);
    expect(lines[0]).toBe('at,by,what,words');
    expect(lines.at(-1)).toContain('"renamed the group from Name 54 to =HYPERLINK(""x""), ""quoted"""');
  });
});
