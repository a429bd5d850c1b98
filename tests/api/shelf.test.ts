import type { Me, ShelfView } from '@stillroom/shared/contracts';
import { cellText, origins } from '@stillroom/shared/document';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell, closeLive, openLive } from '../support/live.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import type { Visitor } from '../support/visitor.ts';

let server: TestServer;
let lead: Me;
let author: Me;
let group: { readonly id: string };
let asLead: Visitor;
let asAuthor: Visitor;

beforeAll(async () => {
  server = await startTestServer();
  lead = await buildPerson(server, { name: 'Ada Quillane' });
  author = await buildPerson(server, { name: 'Ben Ostrander' });
  group = await buildGroup(server, lead, 'Brewhouse');
  await buildMember(server, group, author, 'author');
  [asLead, asAuthor] = [await signIn(server, lead), await signIn(server, author)];
});
afterEach(closeLive);
afterAll(() => server.stop());

const shelf = async (visitor: Visitor) => (await visitor.get('/api/shelf')).body as ShelfView;
const row = async (visitor: Visitor, id: string) =>
  (await shelf(visitor)).notebooks.find((line) => line.id === id);

describe('the Shelf', () => {
  test('shows how the cells of a notebook stand, its claims and its first words', async () => {
    const id = await buildNotebook(server, group, lead, [
      cell('intro', 'prose', '# Heading\n\nDoes *clearance* stall at low pitch?'),
      cell('yeast', 'network', 'A <=> B | 2 /s, 1 /s\nstart A = 3 M'),
      cell('run', 'trajectory', '', { settings: { network: 'yeast', until: 20 } }),
      cell('broken', 'network', 'A --> B'),
      cell('ends', 'claim', 'last(run.species.B) > 1.9'),
      cell('bold', 'claim', 'last(run.species.B) > 99'),
    ]);
    await expect
      .poll(async () => (await row(asLead, id))?.seam, { timeout: 15_000 })
      .toEqual(['prose', 'current', 'current', 'failed', 'current', 'current']);
    expect(await row(asLead, id)).toMatchObject({
      title: 'Diacetyl rest',
      opening: 'Does clearance stall at low pitch?',
      group: { id: group.id, name: 'Brewhouse' },
      role: 'lead',
      claims: { holds: 1, fails: 1, undecided: 0 },
      people: [],
      lastWork: { by: { name: 'Ada Quillane' } },
    });
  });

  test('shows who is there now, who worked last, and follows the title', async () => {
    const id = await buildNotebook(server, group, lead, [cell('intro', 'prose', 'Words')]);
    const live = await openLive(server, author, id);
    live.doc.transact(() => cellText(live.doc, 'intro')?.insert(0, 'New '), origins.author);
    live.doc.transact(() => live.doc.getMap('notebook').set('title', 'Another title'), origins.author);
    await live.allKept();
    await expect
      .poll(async () => row(asLead, id))
      .toMatchObject({
        title: 'Another title',
        opening: 'New Words',
        people: [{ id: author.id, name: 'Ben Ostrander' }],
        lastWork: { by: { id: author.id } },
      });
    live.close();
    await expect.poll(async () => (await row(asLead, id))?.people).toEqual([]);
    expect((await shelf(asLead)).lately.map(({ words }) => words)).toContain(
      'Ben Ostrander wrote in “Another title”',
    );
    expect((await shelf(asAuthor)).lately.map(({ words }) => words)).not.toContain(
      'Ben Ostrander wrote in “Another title”',
    );
  });

  test('keeps what is in the bin apart, for those who can take it out', async () => {
    const id = await buildNotebook(server, group, lead);
    await asLead.delete(`/api/notebooks/${id}`);
    const [ofLead, ofAuthor] = [await shelf(asLead), await shelf(asAuthor)];
    expect(ofLead.bin.map((line) => line.id)).toContain(id);
    expect(ofLead.notebooks.map((line) => line.id)).not.toContain(id);
    expect(ofAuthor.bin).toEqual([]);
  });

  test('says what waits: remarks of others until they are answered or settled', async () => {
    const id = await buildNotebook(server, group, lead, [cell('intro', 'prose', 'Words')], {
      title: 'Waits',
    });
    await asAuthor.post(`/api/notebooks/${id}/remarks`, { cell: 'intro', quote: '', text: 'Hm.' });
    const waits = async (visitor: Visitor) =>
      (await shelf(visitor)).waiting.filter(({ to }) => to.includes(id));
    expect(await waits(asLead)).toMatchObject([
      { words: 'A remark is open in “Waits”', to: `/notebooks/${id}` },
    ]);
    expect(await waits(asAuthor)).toEqual([]);
    const remarks = (await asLead.get(`/api/notebooks/${id}/remarks`)).body as { id: string }[];
    await asLead.post(`/api/notebooks/${id}/remarks/${remarks[0]?.id}/answers`, { text: 'So be it.' });
    expect(await waits(asLead)).toEqual([]);
  });

  test('holds no notebook outside the chosen ones', async () => {
    const [seen, hidden] = [
      await buildNotebook(server, group, lead),
      await buildNotebook(server, group, lead),
    ];
    const limited = await buildPerson(server);
    await buildMember(server, group, limited, 'reader', [seen]);
    const { notebooks } = await shelf(await signIn(server, limited));
    expect(notebooks.map(({ id }) => id)).toEqual([seen]);
    expect(notebooks.map(({ id }) => id)).not.toContain(hidden);
  });
});
