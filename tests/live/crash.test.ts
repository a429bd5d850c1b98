import type { Me } from '@stillroom/shared/contracts';
import { cellText, origins } from '@stillroom/shared/document';
import * as Y from 'yjs';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { loadDocument } from '../../packages/server/src/modules/notebooks/index.ts';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell, closeLive, connectLive } from '../support/live.ts';
import type { LiveClient } from '../support/live-client.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { type ServerProcess, startServerProcess } from '../support/server-process.ts';
import type { Visitor } from '../support/visitor.ts';

const typists = 4;
/** `npm run faults` asks for more. */
const crashes = Number(process.env['CRASHES'] ?? 3);

/** Makes people and notebooks and stays away from the lines; the server that is killed is a process of its own. */
let server: TestServer;
let victim: ServerProcess | null = null;
let notebook: string;
let port: string;
const visitors: Visitor[] = [];

const startVictim = (usePort: string) =>
  startServerProcess({ DATABASE_URL: server.database.url, PORT: usePort, PROCESS: 'server' });

beforeAll(async () => {
  server = await startTestServer();
  const lead = await buildPerson(server);
  const group = await buildGroup(server, lead);
  const people: Me[] = [lead];
  while (people.length < typists) {
    const person = await buildPerson(server);
    await buildMember(server, group, person, 'author');
    people.push(person);
  }
  notebook = await buildNotebook(
    server,
    group,
    lead,
    people.map((_, index) => cell(`c${index}`, 'prose', '')),
  );
  for (const person of people) visitors.push(await signIn(server, person));
  victim = await startVictim('0');
  port = String(victim.port);
});
afterEach(closeLive);
afterAll(async () => {
  await victim?.kill();
  await server.stop();
});

/** Words that are in the document as it is kept, by cell. */
async function keptWords(): Promise<string> {
  const doc = new Y.Doc();
  await loadDocument(server.services.database, notebook, doc);
  return visitors.map((_, index) => cellText(doc, `c${index}`)?.toString() ?? '').join(' ');
}

/** Types words one after another, and remembers which ones were acknowledged. */
function startTyping(
  client: LiveClient,
  index: number,
): { acknowledged: Set<string>; written: Set<string>; stop(): void } {
  const acknowledged = new Set<string>();
  const written = new Set<string>();
  const underway: { word: string; frame: number; line: unknown }[] = [];
  let count = 0;
  const timer = setInterval(() => {
    count += 1;
    const word = `w${index}_${count};`;
    client.doc.transact(() => {
      const text = cellText(client.doc, `c${index}`);
      text?.insert(text.length, word);
    }, origins.author);
    written.add(word);
    if (client.provider.wsconnected && client.provider.synced)
      underway.push({ word, frame: client.sent, line: client.provider.ws });
    for (const edit of underway.splice(0)) {
      if (edit.line !== client.provider.ws) continue;
      if (edit.frame <= client.kept) acknowledged.add(edit.word);
      else underway.push(edit);
    }
  }, 10);
  return { acknowledged, written, stop: () => clearInterval(timer) };
}

describe('kill -9 of the server under typing authors', () => {
  test(
    'loses no acknowledged edit, and what was not acknowledged comes back with the line',
    async () => {
      const address = { url: `http://127.0.0.1:${port}` };
      const clients = visitors.map((visitor) => connectLive(address, visitor, notebook));
      await Promise.all(clients.map((client) => client.synced()));
      const typing = clients.map((client, index) => startTyping(client, index));
      for (let crash = 0; crash < crashes; crash += 1) {
        const before = typing.map(({ acknowledged }) => acknowledged.size);
        const goesOn = () =>
          typing.every(({ acknowledged }, index) => acknowledged.size > (before[index] ?? 0) + 15);
        await expect.poll(goesOn, { timeout: 45_000, interval: 20 }).toBe(true);
        await victim?.kill();
        const known = typing.flatMap(({ acknowledged }) => [...acknowledged]);
        const kept = await keptWords();
        expect(known.filter((word) => !kept.includes(word))).toEqual([]);
        victim = await startVictim(port);
        await Promise.all(clients.map((client) => client.synced()));
      }
      for (const { stop } of typing) stop();
      await Promise.all(clients.map((client) => client.allKept()));
      const kept = await keptWords();
      const written = typing.flatMap((typist) => [...typist.written]);
      expect(written.filter((word) => !kept.includes(word))).toEqual([]);
      const [first, ...others] = clients;
      for (const other of others)
        await other.until(
          () => JSON.stringify(other.doc.getMap('cells')) === JSON.stringify(first?.doc.getMap('cells')),
          'the documents differ',
        );
    },
    crashes * 80_000,
  );
});
