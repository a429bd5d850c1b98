import type { FreezeView, Me, NotebookView, RecordView } from '@stillroom/shared/contracts';
import type { CellContent } from '@stillroom/shared/document';
import { digestOf, engineVersion } from '@stillroom/shared/plan';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell } from '../support/live.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

let server: TestServer;
let lead: Me;
let group: { readonly id: string };
let asLead: Visitor;
let asAuthor: Visitor;
let asReader: Visitor;

beforeAll(async () => {
  server = await startTestServer();
  lead = await buildPerson(server, { name: 'Ada Quillane' });
  const [author, reader] = [await buildPerson(server), await buildPerson(server)];
  group = await buildGroup(server, lead, 'Brewhouse');
  await buildMember(server, group, author, 'author');
  await buildMember(server, group, reader, 'reader');
  [asLead, asAuthor, asReader] = [
    await signIn(server, lead),
    await signIn(server, author),
    await signIn(server, reader),
  ];
});
afterAll(() => server.stop());

const good = (): CellContent[] => [
  cell('intro', 'prose', 'We ask whether it stalls.'),
  cell('yeast', 'network', 'A <=> B | 2 /s, 1 /s\nstart A = 3 M'),
  cell('run', 'trajectory', '', { settings: { network: 'yeast', until: 20 } }),
  cell('ends', 'claim', 'last(run.species.B) > 1.9'),
];
const build = (cells: readonly CellContent[], title = 'Diacetyl rest') =>
  buildNotebook(server, group, lead, cells, { title, subject: 'process safety' });
const freeze = (visitor: Visitor, notebook: string, reasons: Record<string, string> = {}) =>
  visitor.post(`/api/notebooks/${notebook}/freeze`, { reasons });
const check = async (notebook: string) =>
  (await asAuthor.get(`/api/notebooks/${notebook}/freeze`)).body as FreezeView;
const stateOf = (view: FreezeView, id: string) => view.checks.find((found) => found.id === id)?.state;
const settled = (notebook: string) =>
  expect.poll(async () => (await check(notebook)).working, { timeout: 15_000 }).toBe(0);

describe('freezing', () => {
  test('waits for working cells and makes the next record of the group, with everything in it', async () => {
    const notebook = await build(good());
    const { nextNumber } = await check(notebook);
    const frozen = await freeze(asAuthor, notebook);
    expect(frozen.status).toBe(201);
    const { id, number } = frozen.body as { id: string; number: number };
    expect(number).toBe(nextNumber);
    const record = (await asReader.get(`/api/records/${id}`)).body as RecordView;
    expect(record).toMatchObject({
      number,
      title: 'Diacetyl rest',
      subject: 'process safety',
      group: { id: group.id, name: 'Brewhouse' },
      notebook,
      authors: ['Ada Quillane'],
      engine: engineVersion,
      reasons: {},
    });
    expect(record.cells.map((frozenCell) => [frozenCell.id, frozenCell.state])).toEqual([
      ['intro', 'current'],
      ['yeast', 'current'],
      ['run', 'current'],
      ['ends', 'current'],
    ]);
    for (const { result, resultDigest } of record.cells) expect(digestOf(result)).toBe(resultDigest);
    const view = (await asReader.get(`/api/notebooks/${notebook}`)).body as NotebookView;
    expect(view.records).toMatchObject([{ id, number }]);
  });

  test('numbers run through the group, also when several freeze at once', async () => {
    const notebooks = await Promise.all([build(good(), 'One'), build(good(), 'Two'), build(good(), 'Three')]);
    const frozen = await Promise.all(notebooks.map((notebook) => freeze(asAuthor, notebook)));
    expect(frozen.map(({ status }) => status)).toEqual([201, 201, 201]);
    const numbers = frozen.map(({ body }) => (body as { number: number }).number).sort((a, b) => a - b);
    expect(numbers).toEqual([numbers[0], (numbers[0] ?? 0) + 1, (numbers[0] ?? 0) + 2]);
  });

  test('the file of a record carries one digest over everything else in it', async () => {
    const { id } = (await freeze(asAuthor, await build(good()))).body as { id: string };
    const file = await asReader.get(`/api/records/${id}/file`);
    expect(file.headers.get('content-disposition')).toContain('attachment');
    const { digest, ...content } = file.body as { digest: string };
    expect(digestOf(content)).toBe(digest);
    const record = (await asReader.get(`/api/records/${id}`)).body as RecordView;
    expect(record.digest).toBe(digest);
  });

  test('is stopped by failed cells, and names them', async () => {
    const notebook = await build([...good(), cell('wrong', 'network', 'A --> B')]);
    await settled(notebook);
    expect(stateOf(await check(notebook), 'failed')).toBe('blocking');
    const refused = await freeze(asAuthor, notebook);
    expect(refused.status).toBe(409);
    expect((refused.body as { message: string }).message).toContain('wrong:');
    expect(await server.sql('select 1 from record where notebook = $1', [notebook])).toEqual([]);
  });

  test('is stopped by stale cells, and names them', async () => {
    const held = { by: lead.id, at: new Date().toISOString() };
    const notebook = await build([...good(), cell('asleep', 'network', 'X -> Y | 3', { held })]);
    await settled(notebook);
    const view = await check(notebook);
    expect(view.checks.find(({ id }) => id === 'stale')).toMatchObject({
      state: 'blocking',
      cells: [{ id: 'asleep', name: 'asleep', why: 'It is held at an older result.' }],
    });
    expect((await freeze(asAuthor, notebook)).status).toBe(409);
  });

  test('an empty notebook makes no record', async () => {
    expect((await freeze(asAuthor, await build([]))).status).toBe(409);
  });

  test('failing claims and open remarks may stay open for a reason, which is printed', async () => {
    const notebook = await build([...good(), cell('bold', 'claim', 'last(run.species.B) > 99')]);
    await asReader.get(`/api/notebooks/${notebook}`);
    await asAuthor.post(`/api/notebooks/${notebook}/remarks`, {
      cell: 'run',
      quote: '',
      text: 'Long enough?',
    });
    await settled(notebook);
    const view = await check(notebook);
    expect([stateOf(view, 'claims'), stateOf(view, 'remarks')]).toEqual(['open', 'open']);
    const refused = await freeze(asAuthor, notebook, { claims: 'It is meant to fail.' });
    expect(refused.status).toBe(400);
    expect(Object.keys((refused.body as { fields: object }).fields)).toEqual(['remarks']);
    const reasons = { claims: 'It is meant to fail.', remarks: 'Asked of the referees.' };
    const { id } = (await freeze(asAuthor, notebook, { ...reasons, other: 'not asked for' })).body as {
      id: string;
    };
    const record = (await asReader.get(`/api/records/${id}`)).body as RecordView;
    expect(record.reasons).toEqual(reasons);
  });
});

describe('a record', () => {
  test('cannot be altered or taken out, not even by the owner of the database', async () => {
    const { id } = (await freeze(asAuthor, await build(good()))).body as { id: string };
    const application = server.services.database;
    await expect(application.query(`update record set title = 'x' where id = $1`, [id])).rejects.toThrow();
    await expect(server.sql(`update record set title = 'x' where id = $1`, [id])).rejects.toThrow();
    await expect(server.sql('delete from record where id = $1', [id])).rejects.toThrow();
    await expect(server.sql('truncate record cascade')).rejects.toThrow();
  });

  test('stays as it was when the notebook goes on and when it is gone for good', async () => {
    const notebook = await build(good());
    const { id } = (await freeze(asAuthor, notebook)).body as { id: string };
    const before = (await asReader.get(`/api/records/${id}`)).body;
    await asLead.delete(`/api/notebooks/${notebook}`);
    await server.sql('delete from notebook where id = $1', [notebook]);
    expect((await asReader.get(`/api/records/${id}`)).body).toEqual(before);
  });

  test('is public under a link that the lead opens and closes', async () => {
    const { id } = (await freeze(asAuthor, await build(good()))).body as { id: string };
    expect((await asAuthor.put(`/api/records/${id}/public`, { public: true })).status).toBe(403);
    const { publicLink } = (await asLead.put(`/api/records/${id}/public`, { public: true })).body as {
      publicLink: string;
    };
    const token = publicLink.split('/read-record/')[1] ?? '';
    const shown = (await new Visitor(server.url).get(`/api/public-records/${token}`)).body as RecordView;
    expect(shown).toMatchObject({ id, reviews: [], remarks: [] });
    expect(shown.publicLink).toBeUndefined();
    expect(((await asReader.get(`/api/records/${id}`)).body as RecordView).publicLink).toBe(publicLink);
    const file = await new Visitor(server.url).get(`/api/public-records/${token}/file`);
    expect(file.body).toMatchObject({ digest: shown.digest, number: shown.number });
    await asLead.put(`/api/records/${id}/public`, { public: false });
    const closed = await new Visitor(server.url).get(`/api/public-records/${token}`);
    expect(closed.status).toBe(410);
    expect(closed.body).toMatchObject({ error: 'gone' });
  });

  test('is not there for people of other groups', async () => {
    const { id } = (await freeze(asAuthor, await build(good()))).body as { id: string };
    const stranger = await signIn(server, await buildPerson(server));
    expect((await stranger.get(`/api/records/${id}`)).status).toBe(404);
    expect((await new Visitor(server.url).get(`/api/records/${id}`)).status).toBe(401);
  });
});
