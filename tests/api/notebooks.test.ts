import type {
  FairCopy,
  GroupView,
  Me,
  NotebookView,
  RemarkView,
  ResultView,
} from '@stillroom/shared/contracts';
import { checkNotebookFile } from '@stillroom/shared/notebook-file';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell } from '../support/live.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

let server: TestServer;
let lead: Me;
let author: Me;
let group: { readonly id: string };
let asLead: Visitor;
let asAuthor: Visitor;
let asReader: Visitor;

beforeAll(async () => {
  server = await startTestServer();
  lead = await buildPerson(server, { name: 'Ada Quillane' });
  author = await buildPerson(server, { name: 'Ben Ostrander' });
  const reader = await buildPerson(server);
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

const network = (text = 'A <=> B | 2 /s, 1 /s\nstart A = 3 M') => cell('yeast', 'network', text);

/** The fair copy once everything in it is computed. */
async function computed(visitor: Visitor, path: string): Promise<FairCopy> {
  let copy: FairCopy | null = null;
  await expect
    .poll(
      async () => {
        copy = (await visitor.get(path)).body as FairCopy;
        return copy.cells.every(({ state, result }) => state === 'failed' || result !== null);
      },
      { timeout: 15_000 },
    )
    .toBe(true);
  return copy as unknown as FairCopy;
}

describe('a notebook', () => {
  test('is made in a group by those who may, and seen by its members with what they may do', async () => {
    const made = await asAuthor.post(`/api/groups/${group.id}/notebooks`, { title: ' Diacetyl rest ' });
    expect(made.status).toBe(201);
    const { id } = made.body as { id: string };
    const view = (await asReader.get(`/api/notebooks/${id}`)).body as NotebookView;
    expect(view).toMatchObject({
      id,
      title: 'Diacetyl rest',
      group: { id: group.id, name: 'Brewhouse' },
      role: 'reader',
      publicLink: null,
      records: [],
    });
    expect(view.abilities).toContain('notebook.read');
    expect(view.abilities).not.toContain('notebook.edit');
    const { notebooks } = (await asLead.get(`/api/groups/${group.id}`)).body as GroupView;
    expect(notebooks).toContainEqual({ id, title: 'Diacetyl rest', deletedAt: null });
  });

  test('needs a title', async () => {
    const answer = await asAuthor.post(`/api/groups/${group.id}/notebooks`, { title: '  ' });
    expect(answer.status).toBe(400);
    expect(answer.body).toMatchObject({ error: 'invalid', fields: { title: 'A title is needed.' } });
  });

  test('that is not there, and one of another group, are refused in the same words', async () => {
    const stranger = await signIn(server, await buildPerson(server));
    const id = await buildNotebook(server, group, lead);
    const hidden = await stranger.get(`/api/notebooks/${id}`);
    const missing = await stranger.get(`/api/notebooks/${crypto.randomUUID()}`);
    expect(hidden.status).toBe(404);
    expect(hidden.body).toEqual(missing.body);
  });
});

describe('the bin', () => {
  test('closes a notebook with its own words and gives it back as it was', async () => {
    const id = await buildNotebook(server, group, lead, [network()]);
    expect((await asLead.delete(`/api/notebooks/${id}`)).status).toBe(204);
    const closed = await asAuthor.get(`/api/notebooks/${id}`);
    expect(closed.status).toBe(410);
    expect(closed.body).toMatchObject({ error: 'gone', message: 'This notebook is in the bin.' });
    expect((await asLead.post(`/api/notebooks/${id}/restore`)).status).toBe(204);
    expect((await asLead.post(`/api/notebooks/${id}/restore`)).status).toBe(409);
    const copy = await computed(asAuthor, `/api/notebooks/${id}/fair-copy`);
    expect(copy.cells[0]?.text).toContain('A <=> B');
  });

  test('is emptied of what is older than thirty days, and of nothing else', async () => {
    const [old, young] = [await buildNotebook(server, group, lead), await buildNotebook(server, group, lead)];
    await server.sql(`update notebook set deleted_at = now() - interval '31 days' where id = $1`, [old]);
    await server.sql(`update notebook set deleted_at = now() - interval '29 days' where id = $1`, [young]);
    const { emptyBin } = await import('../../packages/server/src/modules/notebooks/commands/bin.ts');
    await emptyBin(server.services.database.manager);
    const left = await server.sql<{ id: string }>('select id from notebook where id = any($1)', [
      [old, young],
    ]);
    expect(left).toEqual([{ id: young }]);
  });
});

describe('the fair copy', () => {
  test('holds every cell with its result, in order', async () => {
    const id = await buildNotebook(server, group, lead, [
      cell('intro', 'prose', '# Why\n\nWe *ask*.'),
      network(),
      cell('broken', 'network', 'A --> B'),
    ]);
    const copy = await computed(asReader, `/api/notebooks/${id}/fair-copy`);
    expect(copy).toMatchObject({ title: 'Diacetyl rest', group: 'Brewhouse', authors: ['Ada Quillane'] });
    expect(copy.cells.map(({ id: cellId, state }) => [cellId, state])).toEqual([
      ['intro', 'current'],
      ['yeast', 'current'],
      ['broken', 'failed'],
    ]);
    expect(copy.cells[1]?.result).toMatchObject({ species: ['A', 'B'] });
    expect(copy.cells[2]?.error).toMatchObject({ line: 1 });
  });

  test('gives each result by its digest, for ever the same', async () => {
    const id = await buildNotebook(server, group, lead, [network()]);
    const copy = await computed(asReader, `/api/notebooks/${id}/fair-copy`);
    const [yeast] = copy.cells;
    const answer = await asReader.get(`/api/notebooks/${id}/results/${yeast?.digest}`);
    expect(answer.headers.get('cache-control')).toContain('immutable');
    expect(answer.body as ResultView).toMatchObject({
      digest: yeast?.digest,
      kind: 'network',
      resultDigest: yeast?.resultDigest,
      result: yeast?.result,
    });
    const other = await buildNotebook(server, group, lead, [cell('n', 'network', 'X -> Y | 1')]);
    await computed(asReader, `/api/notebooks/${other}/fair-copy`);
    expect((await asReader.get(`/api/notebooks/${other}/results/${yeast?.digest}`)).status).toBe(404);
  });

  test('is public while its link is open, and never again under a link that was closed', async () => {
    const id = await buildNotebook(server, group, lead, [network()]);
    expect((await asAuthor.put(`/api/notebooks/${id}/public`, { public: true })).status).toBe(403);
    const opened = (await asLead.put(`/api/notebooks/${id}/public`, { public: true })).body as NotebookView;
    const token = opened.publicLink?.split('/read/')[1] ?? '';
    const anyone = new Visitor(server.url);
    const copy = await computed(anyone, `/api/public/${token}`);
    expect(copy.cells[0]?.result).toMatchObject({ species: ['A', 'B'] });
    const closed = (await asLead.put(`/api/notebooks/${id}/public`, { public: false })).body as NotebookView;
    expect(closed.publicLink).toBeNull();
    expect((await anyone.get(`/api/public/${token}`)).status).toBe(410);
    const again = (await asLead.put(`/api/notebooks/${id}/public`, { public: true })).body as NotebookView;
    expect(again.publicLink).not.toContain(token);
    expect((await anyone.get(`/api/public/${token}`)).status).toBe(410);
  });
});

describe('notebook files', () => {
  test('go out and come in again with everything in them', async () => {
    const id = await buildNotebook(
      server,
      group,
      lead,
      [
        cell('intro', 'prose', 'Words'),
        network(),
        cell('run', 'trajectory', '', {
          settings: { network: 'yeast', until: 3 },
          held: { by: lead.id, at: 'now' },
        }),
      ],
      { title: 'Beads / on a "ring"', subject: 'clinical' },
    );
    const file = await asReader.get(`/api/notebooks/${id}/file`);
    expect(file.headers.get('content-disposition')).toContain('Beads on a ring.stillroom.json');
    expect(checkNotebookFile(file.body)).toMatchObject({ ok: true });
    const imported = await asAuthor.post(`/api/groups/${group.id}/notebook-files`, file.body);
    expect(imported.status).toBe(201);
    const { id: copy } = imported.body as { id: string };
    expect((await asReader.get(`/api/notebooks/${copy}/file`)).body).toEqual(file.body);
  });

  test('that are none are refused with the reason and make nothing', async () => {
    const before = await server.sql('select 1 from notebook');
    for (const [file, words] of [
      [{ format: 'something/1' }, 'stillroom-notebook/1'],
      [{ format: 'stillroom-notebook/1', cells: [{ kind: 'teapot', name: 'a' }] }, 'teapot'],
      [
        {
          format: 'stillroom-notebook/1',
          cells: [
            { kind: 'network', name: 'a' },
            { kind: 'network', name: 'a' },
          ],
        },
        'both called a',
      ],
    ] as const) {
      const answer = await asAuthor.post(`/api/groups/${group.id}/notebook-files`, file);
      expect(answer.status).toBe(400);
      expect((answer.body as { message: string }).message).toContain(words);
    }
    expect(await server.sql('select 1 from notebook')).toHaveLength(before.length);
  });

  test('of several megabytes are taken; beyond the limit they are refused in words', async () => {
    const file = (size: number) => ({
      format: 'stillroom-notebook/1',
      title: 'Large',
      cells: Array.from({ length: Math.ceil(size / 1_000_000) }, (_, place) => ({
        id: `c${place}`,
        kind: 'prose',
        text: 'x'.repeat(1_000_000),
      })),
    });
    expect((await asAuthor.post(`/api/groups/${group.id}/notebook-files`, file(4e6))).status).toBe(201);
    const tooLarge = await asAuthor.post(`/api/groups/${group.id}/notebook-files`, file(18e6));
    expect(tooLarge.status).toBe(413);
    expect(tooLarge.body).toMatchObject({ error: 'too-large' });
  });
});

describe('pictures', () => {
  const png = Uint8Array.from(
    atob('iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg=='),
    (letter) => letter.charCodeAt(0),
  );
  const upload = (visitor: Visitor, id: string, bytes: Uint8Array<ArrayBuffer>) => {
    const form = new FormData();
    form.set('picture', new Blob([bytes]), 'whatever.png');
    return visitor.post(`/api/notebooks/${id}/pictures`, form);
  };

  test('are kept for those who write, and shown in the notebook they belong to', async () => {
    const id = await buildNotebook(server, group, lead);
    const { status, body } = await upload(asAuthor, id, png);
    expect(status).toBe(201);
    const { url } = body as { url: string };
    const shown = await asReader.get(url);
    expect(shown.headers.get('content-type')).toBe('image/png');
    const elsewhere = await buildNotebook(server, group, lead);
    expect((await asReader.get(url.replace(id, elsewhere))).status).toBe(404);
  });

  test('that are no pictures, or come from a reader, are refused', async () => {
    const id = await buildNotebook(server, group, lead);
    const script = new TextEncoder().encode('<svg onload="alert(1)">');
    expect((await upload(asAuthor, id, script)).status).toBe(400);
    expect((await upload(asReader, id, png)).status).toBe(403);
  });
});

describe('remarks', () => {
  test('are written, answered and settled, and everybody in the notebook is told', async () => {
    const id = await buildNotebook(server, group, lead, [network()]);
    const words = { cell: 'yeast', quote: 'A', text: 'Why not C?' };
    const { status, body } = await asAuthor.post(`/api/notebooks/${id}/remarks`, words);
    expect(status).toBe(201);
    const remark = body as RemarkView;
    expect(remark).toMatchObject({
      ...words,
      by: { name: 'Ben Ostrander', initials: 'BO' },
      answers: [],
      settled: null,
    });
    const answered = await asLead.post(`/api/notebooks/${id}/remarks/${remark.id}/answers`, {
      text: 'Because.',
    });
    expect(answered.body).toMatchObject({ answers: [{ text: 'Because.', by: { name: 'Ada Quillane' } }] });
    const settled = await asAuthor.patch(`/api/notebooks/${id}/remarks/${remark.id}`, { settled: true });
    expect(settled.body).toMatchObject({ settled: { by: { name: 'Ben Ostrander' } } });
    const opened = await asAuthor.patch(`/api/notebooks/${id}/remarks/${remark.id}`, { settled: false });
    expect(opened.body).toMatchObject({ settled: null });
    expect((await asReader.get(`/api/notebooks/${id}/remarks`)).body).toEqual([opened.body]);
  });

  test('of another notebook cannot be answered through this one', async () => {
    const [one, two] = [await buildNotebook(server, group, lead), await buildNotebook(server, group, lead)];
    const words = { cell: 'c', quote: '', text: 'Hm.' };
    const remark = (await asAuthor.post(`/api/notebooks/${one}/remarks`, words)).body as RemarkView;
    const answer = await asAuthor.post(`/api/notebooks/${two}/remarks/${remark.id}/answers`, { text: 'No.' });
    expect(answer.status).toBe(404);
  });
});
