import type { Me } from '@stillroom/shared/contracts';
import { cellOrder, cellText, moveCell, origins, readNotebook } from '@stillroom/shared/document';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { readContent } from '../../packages/server/src/modules/notebooks/index.ts';
import { buildGroup, buildMember, buildPerson } from '../support/build.ts';
import { buildNotebook, cell, closeLive, openLive } from '../support/live.ts';
import type { LiveClient } from '../support/live-client.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
let ada: Me;
let ben: Me;
let notebook: string;

beforeAll(async () => {
  server = await startTestServer();
  [ada, ben] = [await buildPerson(server), await buildPerson(server)];
  const group = await buildGroup(server, ada);
  await buildMember(server, group, ben, 'author');
  notebook = await buildNotebook(server, group, ada, [
    cell('intro', 'prose', 'What is asked'),
    cell('yeast', 'network', 'A -> B'),
    cell('close', 'prose', 'What follows'),
  ]);
});
afterEach(closeLive);
afterAll(() => server.stop());

const textOf = (client: LiveClient, id = 'yeast') => cellText(client.doc, id)?.toString() ?? '';
const write = (client: LiveClient, at: number, words: string, id = 'yeast') =>
  client.doc.transact(() => cellText(client.doc, id)?.insert(at, words), origins.author);
const kept = async (id: string) =>
  (await readContent(server.services.database, notebook)).cells.find((found) => found.id === id)?.text;

describe('two authors at once', () => {
  test('write into one cell and see the same', async () => {
    const [a, b] = [await openLive(server, ada, notebook), await openLive(server, ben, notebook)];
    for (let turn = 0; turn < 40; turn += 1) {
      write(a, 0, 'a');
      write(b, textOf(b).length, 'b');
    }
    await Promise.all([a.allKept(), b.allKept()]);
    const both = (client: LiveClient) =>
      textOf(client).split('a').length === 41 && textOf(client).split('b').length === 41;
    await a.until(() => both(a), 'Ada lacks edits');
    await b.until(() => both(b), 'Ben lacks edits');
    expect(textOf(a)).toBe(textOf(b));
    expect(await kept('yeast')).toBe(textOf(a));
  });

  test('a cell that is moved keeps what a co-author types into it meanwhile', async () => {
    const [a, b] = [await openLive(server, ada, notebook), await openLive(server, ben, notebook)];
    a.provider.disconnect();
    write(a, 0, 'typed while moved: ');
    moveCell(b.doc, 'yeast', 'close', origins.author);
    await b.allKept();
    a.provider.connect();
    await a.synced();
    await a.allKept();
    await b.until(() => textOf(b).startsWith('typed while moved: '), 'the typing did not come');
    expect(cellOrder(a.doc)).toEqual(['intro', 'close', 'yeast']);
    expect(readNotebook(a.doc)).toEqual(readNotebook(b.doc));
  });

  test('what was written offline is merged on return, deletions too', async () => {
    const [a, b] = [await openLive(server, ada, notebook), await openLive(server, ben, notebook)];
    a.provider.disconnect();
    const before = textOf(a, 'intro');
    a.doc.transact(() => cellText(a.doc, 'intro')?.delete(0, 5), origins.author);
    write(a, 0, 'Offline: ', 'intro');
    write(b, textOf(b, 'intro').length, ' (online)', 'intro');
    await b.allKept();
    a.provider.connect();
    await a.synced();
    await a.allKept();
    const merged = `Offline: ${before.slice(5)} (online)`;
    await b.until(() => textOf(b, 'intro') === merged, 'the offline edits did not come');
    expect(textOf(a, 'intro')).toBe(merged);
    expect(await kept('intro')).toBe(merged);
  });

  test('see who is here, and no longer who has left', async () => {
    const [a, b] = [await openLive(server, ada, notebook), await openLive(server, ben, notebook)];
    const show = (client: LiveClient, { id, name, initials, hue }: Me) =>
      client.provider.awareness.setLocalStateField('user', { id, name, initials, hue });
    const seen = (client: LiveClient) =>
      [...client.provider.awareness.getStates().values()].flatMap(
        ({ user }) => (user as Me | undefined)?.id ?? [],
      );
    show(a, ada);
    show(b, ben);
    await poll(() => seen(a).includes(ben.id) && seen(b).includes(ada.id));
    a.close();
    await poll(() => !seen(b).includes(ada.id));
    expect(seen(b)).toEqual([ben.id]);
  });
});

describe('what is acknowledged', () => {
  test('counts every frame of the line, those that change nothing too', async () => {
    const a = await openLive(server, ada, notebook);
    await a.allKept();
    for (let turn = 0; turn < 25; turn += 1) write(a, 0, 'x');
    await a.allKept();
    expect(a.kept).toBe(a.sent);
    expect(a.sent).toBeGreaterThanOrEqual(25);
  });

  test('survives compaction while people type: nothing is lost and the log grows short', async () => {
    const [a, b] = [await openLive(server, ada, notebook), await openLive(server, ben, notebook)];
    const before = textOf(a).length;
    for (let turn = 0; turn < 500; turn += 1) {
      write(a, 0, 'm');
      write(b, textOf(b).length, 'n');
      if (turn % 25 === 0) await a.allKept();
    }
    await Promise.all([a.allKept(), b.allKept()]);
    expect(await kept('yeast')).toHaveLength(before + 1000);
    const [log] = await server.sql<{ rows: number }>(
      'select count(*)::int as rows from notebook_update where notebook = $1',
      [notebook],
    );
    expect(log?.rows).toBeLessThan(900);
  });
});

async function poll(holds: () => boolean): Promise<void> {
  await expect.poll(holds, { timeout: 5000 }).toBe(true);
}
