import type { Me } from '@stillroom/shared/contracts';
import {
  cellText,
  nameCell,
  origins,
  readNotebook,
  writeAbout,
  writeSettings,
} from '@stillroom/shared/document';
import { limits } from '@stillroom/shared/protocol';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { readContent } from '../../packages/server/src/modules/notebooks/index.ts';
import { buildGroup, buildMember, buildPerson } from '../support/build.ts';
import { buildNotebook, cell, closeLive, openLive } from '../support/live.ts';
import type { LiveClient } from '../support/live-client.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

/* Bad input over live lines: clear words on the cell it concerns, the others go on, nothing typed is lost. */

let server: TestServer;
let ada: Me;
let ben: Me;
let group: { readonly id: string };
beforeAll(async () => {
  server = await startTestServer();
  [ada, ben] = [await buildPerson(server), await buildPerson(server)];
  group = await buildGroup(server, ada);
  await buildMember(server, group, ben, 'author');
});
afterEach(closeLive);
afterAll(() => server.stop());

const open = async (cells: Parameters<typeof buildNotebook>[3]) => {
  const notebook = await buildNotebook(server, group, ada, cells);
  return { notebook, a: await openLive(server, ada, notebook), b: await openLive(server, ben, notebook) };
};
const insert = (client: LiveClient, id: string, words: string) =>
  client.doc.transact(() => cellText(client.doc, id)?.insert(0, words), origins.author);
const textOf = (client: LiveClient, id: string) => cellText(client.doc, id)?.toString() ?? '';
const pair = () => [
  cell('n', 'network', 'A -> B | 1\nstart A = 1'),
  cell('run', 'trajectory', '', { settings: { network: 'n', until: 1, points: 3 } }),
];

describe('names', () => {
  test('taken: both cells say so, with what to do, and are well again when one changes', async () => {
    const { a, b } = await open([...pair(), cell('m', 'network', 'C -> D | 1')]);
    await b.cell('run', ({ state }) => state === 'current', 'the run');
    nameCell(a.doc, 'm', 'n', origins.author);
    for (const id of ['n', 'm']) {
      const { error } = await b.cell(id, ({ state }) => state === 'failed', 'the clash');
      expect(error).toMatchObject({ message: 'Two cells are called n.', hint: expect.any(String) as string });
    }
    const { error } = await b.cell('run', ({ state }) => state === 'failed', 'what draws on it');
    expect(error?.message).toContain('Two cells are called n');
    nameCell(b.doc, 'm', 'other', origins.author);
    for (const id of ['n', 'm', 'run']) await a.cell(id, ({ state }) => state === 'current', 'well again');
  });

  test('changed by two people at once: both see one name, and whatever still speaks of the other says which is meant', async () => {
    const { a, b } = await open(pair());
    await a.cell('run', ({ state }) => state === 'current', 'the run');
    // Each renames the cell and follows through, without hearing of the other.
    for (const [client, name] of [
      [a, 'yeast_a'],
      [b, 'yeast_b'],
    ] as const) {
      client.provider.disconnect();
      nameCell(client.doc, 'n', name, origins.author);
      writeSettings(client.doc, 'run', { network: name, until: 1, points: 3 }, origins.author);
    }
    for (const client of [a, b]) client.provider.connect();
    for (const client of [a, b]) await client.synced();
    const name = (client: LiveClient) =>
      readNotebook(client.doc).cells.find(({ id }) => id === 'n')?.name ?? '';
    await a.until(() => name(a) === name(b), 'one name');
    expect(['yeast_a', 'yeast_b']).toContain(name(a));
    const settled = await a.cell('run', ({ state }) => state !== 'working' && state !== 'stale', 'settled');
    if (settled.state === 'failed') {
      expect(settled.error?.message).toMatch(/^There is no cell called yeast_[ab]\.$/u);
      expect(settled.error?.hint).toBe(`Is ${name(a)} meant?`);
    }
    writeSettings(a.doc, 'run', { network: name(a), until: 1, points: 3 }, origins.author);
    await b.cell('run', ({ state }) => state === 'current', 'repaired');
  });

  test('a title changed by two people at once is one of the two for both', async () => {
    const { notebook, a, b } = await open(pair());
    a.provider.disconnect();
    writeAbout(a.doc, { title: 'From Ada' }, origins.author);
    writeAbout(b.doc, { title: 'From Ben' }, origins.author);
    a.provider.connect();
    await a.synced();
    await Promise.all([a.allKept(), b.allKept()]);
    const title = (client: LiveClient) => readNotebook(client.doc).title;
    await b.until(() => title(a) === title(b), 'one title');
    expect(['From Ada', 'From Ben']).toContain(title(a));
    expect((await readContent(server.services.database, notebook)).title).toBe(title(a));
  });
});

describe('too much', () => {
  test('a family of 10^7 rows is refused with its size, and the other cells go on', async () => {
    const { a, b } = await open([
      cell('big', 'network', 'A -> B | 1'),
      cell('small', 'network', 'C -> D | 1'),
    ]);
    await a.cell('big', ({ state }) => state === 'current', 'at first');
    insert(a, 'big', '[i = 1..10000000] X[i] -> 0\n');
    const { error } = await b.cell('big', ({ state }) => state === 'failed', 'refused');
    expect(error).toMatchObject({
      line: 1,
      message: expect.stringContaining('10,000,000 reactions') as string,
      hint: expect.any(String) as string,
    });
    insert(b, 'small', 'E -> F | 1\n');
    await a.cell('small', ({ result }) => JSON.stringify(result ?? '').includes('"E"'), 'the other cell');
  });

  test('2 MB pasted into prose are kept and shared; what is beyond is said, and nothing is lost', async () => {
    const { notebook, a, b } = await open([cell('p', 'prose', '!'), ...pair()]);
    const paragraph = 'A paragraph that somebody pasted, with words in it.\n\n';
    const pasted = paragraph.repeat(Math.floor((limits.cellText - 10) / paragraph.length));
    expect(pasted.length).toBeGreaterThan(1_999_000);
    insert(a, 'p', pasted);
    await a.allKept();
    await b.until(() => textOf(b, 'p').length === pasted.length + 1, 'the paste did not come over');
    insert(a, 'p', 'x'.repeat(2000));
    await a.allKept();
    const { error } = await b.cell('p', ({ state }) => state === 'failed', 'beyond');
    expect(error?.message).toMatch(/This prose has 20\d+ characters; a cell takes at most 2000000/u);
    insert(b, 'n', 'C -> D | 1\n');
    await a.cell('n', ({ result }) => JSON.stringify(result ?? '').includes('"C"'), 'the other cells');
    const kept = await readContent(server.services.database, notebook);
    expect(kept.cells.find(({ id }) => id === 'p')?.text).toBe(`${'x'.repeat(2000)}${pasted}!`);
    a.doc.transact(() => cellText(a.doc, 'p')?.delete(0, 2000 + pasted.length), origins.author);
    await b.cell('p', ({ state }) => state === 'current', 'well again');
  });
});

describe('two tabs of one person', () => {
  test('write into one cell, are shown as one person in two places, and each closes for itself', async () => {
    const notebook = await buildNotebook(server, group, ada, pair());
    const [one, two] = [await openLive(server, ada, notebook), await openLive(server, ada, notebook)];
    const other = await openLive(server, ben, notebook);
    const show = (client: LiveClient, at: string) =>
      client.provider.awareness.setLocalState({ user: { id: ada.id, name: ada.name }, cell: at });
    show(one, 'n');
    show(two, 'run');
    insert(one, 'n', 'C -> D | 1\n');
    insert(two, 'n', 'E -> F | 1\n');
    await Promise.all([one.allKept(), two.allKept()]);
    await one.until(() => textOf(one, 'n').includes('E -> F'), 'the other tab’s edit');
    await two.until(() => textOf(two, 'n') === textOf(one, 'n'), 'one text');
    const places = () =>
      [...other.provider.awareness.getStates().values()]
        .filter((state) => (state['user'] as { id?: string } | undefined)?.id === ada.id)
        .map((state) => state['cell'] as string)
        .sort();
    await other.until(() => places().length === 2, 'both places');
    expect(places()).toEqual(['n', 'run']);
    one.close();
    await other.until(() => places().length === 1, 'one place');
    expect(places()).toEqual(['run']);
    insert(two, 'n', 'G -> H | 1\n');
    await two.allKept();
    await other.until(() => textOf(other, 'n').includes('G -> H'), 'the tab that is left goes on');
  });
});
