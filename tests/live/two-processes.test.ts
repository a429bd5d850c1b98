import type { Me, ShelfView } from '@stillroom/shared/contracts';
import { cellText, origins } from '@stillroom/shared/document';
import { closeCodes } from '@stillroom/shared/protocol';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell, closeLive, connectLive, openLive } from '../support/live.ts';
import type { LiveClient } from '../support/live-client.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { type ServerProcess, startServerProcess } from '../support/server-process.ts';

/** Serves and computes; the other process only serves, against the same database. */
let server: TestServer;
let other: ServerProcess;
let ada: Me;
let ben: Me;
let group: { readonly id: string };

beforeAll(async () => {
  server = await startTestServer();
  other = await startServerProcess({ DATABASE_URL: server.database.url, PORT: '0', PROCESS: 'server' });
  [ada, ben] = [await buildPerson(server), await buildPerson(server)];
  group = await buildGroup(server, ada);
  await buildMember(server, group, ben, 'author');
});
afterEach(closeLive);
afterAll(async () => {
  await other.kill();
  await server.stop();
});

async function openElsewhere(person: Me, notebook: string): Promise<LiveClient> {
  const address = { url: `http://127.0.0.1:${other.port}` };
  const client = connectLive(address, await signIn(server, person), notebook);
  await client.synced();
  return client;
}
const write = (client: LiveClient, words: string) =>
  client.doc.transact(() => {
    const text = cellText(client.doc, 'n');
    text?.insert(text.length, words);
  }, origins.author);
const textOf = (client: LiveClient) => cellText(client.doc, 'n')?.toString() ?? '';

describe('one notebook in two server processes', () => {
  test('edits of either side reach the other, and both see the results', async () => {
    const notebook = await buildNotebook(server, group, ada, [cell('n', 'network', 'A -> B | 1\n')]);
    const [a, b] = [await openLive(server, ada, notebook), await openElsewhere(ben, notebook)];
    write(a, 'C -> D | 1\n');
    await b.until(() => textOf(b).includes('C -> D'), 'the edit did not come over');
    write(b, 'E -> F | 1\n');
    await a.until(() => textOf(a).includes('E -> F'), 'the edit did not come back');
    for (const client of [a, b]) {
      const species = ({ result }: { readonly result?: unknown }) =>
        (result as { species?: string[] } | undefined)?.species?.length;
      await client.cell('n', (notice) => notice.state === 'current' && species(notice) === 6, 'the result');
    }
  });

  test('names and cursors of either side are seen by the other, until they leave', async () => {
    const notebook = await buildNotebook(server, group, ada, [cell('n', 'network', 'A -> B | 1\n')]);
    const a = await openLive(server, ada, notebook);
    const show = (client: LiveClient, person: Me, cursor: string) => {
      const { id, name, initials, hue } = person;
      client.provider.awareness.setLocalState({ user: { id, name, initials, hue }, cell: 'n', cursor });
    };
    const seenBy = (client: LiveClient, of: LiveClient) =>
      client.provider.awareness.getStates().get(of.doc.clientID) as
        { readonly user: { readonly name: string }; readonly cursor: string } | undefined;
    show(a, ada, 'at the start');
    // Who comes later by the other process is told of those who are there already.
    const b = await openElsewhere(ben, notebook);
    await b.until(() => seenBy(b, a)?.cursor === 'at the start', 'the first was not shown to the second');
    expect(seenBy(b, a)?.user.name).toBe(ada.name);
    show(b, ben, 'first');
    await a.until(() => seenBy(a, b)?.cursor === 'first', 'the second was not shown to the first');
    for (const cursor of ['second', 'third', 'last']) show(b, ben, cursor);
    await a.until(() => seenBy(a, b)?.cursor === 'last', 'the cursor did not follow');
    // More than one piece of news holds: the name is shown all the same.
    show(b, ben, 'x'.repeat(7500));
    await a.until(() => seenBy(a, b)?.cursor === undefined, 'the long state did not come');
    expect(seenBy(a, b)?.user.name).toBe(ben.name);
    const visitor = await signIn(server, ada);
    const here = async () => {
      const { notebooks } = (await visitor.get('/api/shelf')).body as ShelfView;
      const row = notebooks.find(({ id }) => id === notebook);
      return row?.people.map(({ name }) => name).sort();
    };
    await expect.poll(here).toEqual([ada.name, ben.name].sort());
    b.close();
    await a.until(() => seenBy(a, b) === undefined, 'who left is still shown');
    await expect.poll(here).toEqual([ada.name]);
  });

  test('a role taken away through one process closes the line to the other', async () => {
    const notebook = await buildNotebook(server, group, ada, [cell('n', 'network', 'A -> B | 1\n')]);
    const b = await openElsewhere(ben, notebook);
    const change = { role: 'reader', notebooks: null };
    await (await signIn(server, ada)).patch(`/api/groups/${group.id}/members/${ben.id}`, change);
    expect(await b.end()).toBe(closeCodes.refused);
  });
});
