import type { Me } from '@stillroom/shared/contracts';
import { cellText, origins } from '@stillroom/shared/document';
import { closeCodes, limits } from '@stillroom/shared/protocol';
import { type GroupRole, groupRoles, may } from '@stillroom/shared/roles';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { WebSocket } from 'ws';
import * as Y from 'yjs';
import { messageAbilities } from '../../packages/server/src/modules/collaboration/index.ts';
import { readContent } from '../../packages/server/src/modules/notebooks/index.ts';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell, closeLive, connectLive, liveAddress, openLive } from '../support/live.ts';
import { frames } from '../support/live-frames.ts';
import type { LiveClient } from '../support/live-client.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

let server: TestServer;
let lead: Me;
let group: { readonly id: string };
let notebook: string;

beforeAll(async () => {
  server = await startTestServer();
  lead = await buildPerson(server);
  group = await buildGroup(server, lead);
  notebook = await buildNotebook(server, group, lead, [cell('yeast', 'network', 'A -> B')]);
});
afterEach(closeLive);
afterAll(() => server.stop());

const member = async (role: GroupRole, notebooks: string[] | null = null): Promise<Me> => {
  const person = await buildPerson(server);
  await buildMember(server, group, person, role, notebooks);
  return person;
};
const keptText = async () => (await readContent(server.services.database, notebook)).cells[0]?.text ?? '';
const write = (client: LiveClient, words: string) =>
  client.doc.transact(() => cellText(client.doc, 'yeast')?.insert(0, words), origins.author);

/** An edit as bytes that only this client has. */
function secretEdit(words: string): Uint8Array {
  const doc = new Y.Doc();
  doc.getMap('notebook').set('title', words);
  return Y.encodeStateAsUpdate(doc);
}

describe('every message of the protocol, for every role', () => {
  const messages = {
    step1: () => frames.step1(new Y.Doc()),
    step2: () => frames.step2(secretEdit('by step 2')),
    update: () => frames.update(secretEdit('by update')),
    awareness: () => frames.awareness(4711, { cell: null }),
  } satisfies Record<keyof typeof messageAbilities, () => Uint8Array>;
  const kinds = Object.keys(messageAbilities) as (keyof typeof messageAbilities)[];

  for (const role of groupRoles) {
    for (const kind of kinds) {
      const allowed = may(role, messageAbilities[kind]);
      test(`${role}: ${kind} is ${allowed ? 'taken' : 'refused and ends the line'}`, async () => {
        const client = await openLive(server, await member(role), notebook);
        client.sendRaw(messages[kind]());
        if (allowed) {
          client.sendRaw(frames.step2(new Uint8Array([0, 0])));
          await client.until(() => client.kept > 0, 'the line gave no sign');
          expect(client.closed).toBeNull();
        } else {
          expect(await client.end()).toBe(closeCodes.refused);
        }
      });
    }
  }

  test('nothing that was refused is kept', async () => {
    const { title } = await readContent(server.services.database, notebook);
    const reader = await openLive(server, await member('reader'), notebook);
    reader.sendRaw(frames.update(secretEdit('the reader was here')));
    await reader.end();
    const after = await readContent(server.services.database, notebook);
    expect(after.title).toBe(title);
    expect(after.title).not.toContain('reader');
  });

  test('what is not of the protocol ends the line with its own code', async () => {
    const author = await openLive(server, await member('author'), notebook);
    author.sendRaw(new Uint8Array([42, 1, 2]));
    expect(await author.end()).toBe(closeCodes.malformed);
    const another = await openLive(server, await member('author'), notebook);
    another.sendRaw(frames.update(new Uint8Array([9, 9, 9, 9])));
    expect(await another.end()).toBe(closeCodes.malformed);
  });

  test('a frame larger than allowed ends the line for good, so that it is not sent again and again', async () => {
    const author = await openLive(server, await member('author'), notebook);
    author.sendRaw(frames.update(new Uint8Array(limits.frame + 1)));
    expect(await author.end()).toBe(closeCodes.tooMuch);
  });

  test('an author’s presence cannot bear another name', async () => {
    const author = await member('author');
    const [honest, liar] = [await openLive(server, lead, notebook), await openLive(server, author, notebook)];
    liar.sendRaw(frames.awareness(815, { user: { id: lead.id, name: 'The lead' } }));
    liar.sendRaw(frames.awareness(816, { user: { id: author.id, name: 'Me' } }));
    await honest.until(() => honest.provider.awareness.getStates().has(816), 'the presence did not come');
    expect(honest.provider.awareness.getStates().has(815)).toBe(false);
  });
});

describe('who may open a line', () => {
  const closing = async (address: ReturnType<typeof liveAddress>) =>
    new Promise<number>((resolve, reject) => {
      const line = new WebSocket(`${address.url}/${address.notebook}`, { headers: address.headers });
      line.on('close', resolve);
      line.on('error', reject);
    });

  test('nobody signed in: 4401', async () => {
    expect(await closing(liveAddress(server, new Visitor(server.url), notebook))).toBe(closeCodes.signedOut);
  });

  test('somebody of another group, or a member limited to other notebooks: 4403', async () => {
    const stranger = await signIn(server, await buildPerson(server));
    expect(await closing(liveAddress(server, stranger, notebook))).toBe(closeCodes.refused);
    const other = await buildNotebook(server, group, lead);
    const limited = await signIn(server, await member('author', [other]));
    expect(await closing(liveAddress(server, limited, notebook))).toBe(closeCodes.refused);
    expect((await openLimited(limited, other)).closed).toBeNull();
  });

  test('the operator of the installation, and whoever holds a link without an account', async () => {
    const operator = await signIn(server, await buildPerson(server, { operator: true }));
    expect(await closing(liveAddress(server, operator, notebook))).toBe(closeCodes.refused);
    const asLead = await signIn(server, lead);
    await asLead.send('PUT', `/api/notebooks/${notebook}/public`, { public: true });
    const address = liveAddress(server, new Visitor(server.url), notebook);
    expect(await closing(address)).toBe(closeCodes.signedOut);
  });

  test('more lines than one person may have: the one too many is told so, the others stay', async () => {
    const visitor = await signIn(server, await member('reader'));
    const address = liveAddress(server, visitor, notebook);
    const lines = Array.from(
      { length: limits.linesOfOne },
      () => new WebSocket(`${address.url}/${address.notebook}`, { headers: address.headers }),
    );
    // The first frame says that a line was let in.
    await Promise.all(lines.map((line) => new Promise((resolve) => line.once('message', resolve))));
    expect(await closing(address)).toBe(closeCodes.crowded);
    expect(lines.every((line) => line.readyState === WebSocket.OPEN)).toBe(true);
    lines[0]?.close();
    await expect
      .poll(async () => {
        const line = new WebSocket(`${address.url}/${address.notebook}`, { headers: address.headers });
        const came = await new Promise((resolve) => {
          line.once('message', () => resolve('let in'));
          line.once('close', resolve);
        });
        line.close();
        return came;
      })
      .toBe('let in');
    for (const line of lines) line.terminate();
  });

  const openLimited = async (visitor: Visitor, id: string) => {
    const client = connectLive(server, visitor, id);
    await client.synced();
    return client;
  };

  test('a page of another site with the right cookie: 4403', async () => {
    const address = liveAddress(server, await signIn(server, lead), notebook);
    const foreign = { ...address, headers: { ...address.headers, origin: 'https://elsewhere.example' } };
    expect(await closing(foreign)).toBe(closeCodes.refused);
  });

  test('a notebook that is not there, or in the bin: 4404', async () => {
    const visitor = await signIn(server, lead);
    expect(await closing(liveAddress(server, visitor, crypto.randomUUID()))).toBe(closeCodes.gone);
    expect(await closing(liveAddress(server, visitor, 'no-such-thing'))).toBe(closeCodes.gone);
    const binned = await buildNotebook(server, group, lead);
    await visitor.delete(`/api/notebooks/${binned}`);
    expect(await closing(liveAddress(server, visitor, binned))).toBe(closeCodes.gone);
  });
});

describe('access that changes while the line is open', () => {
  test('author made reader: the line ends at once, and nothing written afterwards is applied or kept', async () => {
    const [author, colleague] = [await member('author'), await member('author')];
    const visitor = await signIn(server, lead);
    const [a, b] = [await openLive(server, author, notebook), await openLive(server, colleague, notebook)];
    write(a, 'before ');
    await a.allKept();
    const change = { role: 'reader', notebooks: null };
    const answer = await visitor.patch(`/api/groups/${group.id}/members/${author.id}`, change);
    expect(answer.status).toBe(200);
    write(a, 'after ');
    expect(await a.end()).toBe(closeCodes.refused);
    write(b, 'and by the other ');
    await b.allKept();
    expect(await keptText()).toContain('and by the other before ');
    expect(await keptText()).not.toContain('after ');
    expect(cellText(b.doc, 'yeast')?.toString()).not.toContain('after ');
    const again = await openLive(server, author, notebook);
    expect(cellText(again.doc, 'yeast')?.toString()).toBe(await keptText());
  });

  test('taken out of the group: the line ends at once', async () => {
    const reader = await member('reader');
    const client = await openLive(server, reader, notebook);
    await (await signIn(server, lead)).delete(`/api/groups/${group.id}/members/${reader.id}`);
    expect(await client.end()).toBe(closeCodes.refused);
  });

  test('reader made author: is told, and may write on the same line', async () => {
    const person = await member('reader');
    const client = await openLive(server, person, notebook);
    const change = { role: 'author', notebooks: null };
    await (await signIn(server, lead)).patch(`/api/groups/${group.id}/members/${person.id}`, change);
    await client.until(() => client.notices.some(({ topic }) => topic === 'access'), 'nothing was told');
    write(client, 'promoted ');
    await client.allKept();
    expect(await keptText()).toContain('promoted ');
  });

  test('signed out everywhere: lines of the other sessions end with 4401', async () => {
    const person = await member('author');
    const elsewhere = await openLive(server, person, notebook);
    const here = await signIn(server, person);
    const own = connectLive(server, here, notebook);
    await own.synced();
    await here.delete('/api/account/sessions');
    expect(await elsewhere.end()).toBe(closeCodes.signedOut);
    write(own, 'still here ');
    await own.allKept();
    expect(own.closed).toBeNull();
  });

  test('put into the bin: every line ends with 4404; taken out again, it is as it was', async () => {
    const id = await buildNotebook(server, group, lead, [cell('n', 'network', 'A -> B')]);
    const client = await openLive(server, lead, id);
    const visitor = await signIn(server, lead);
    expect((await visitor.delete(`/api/notebooks/${id}`)).status).toBe(204);
    expect(await client.end()).toBe(closeCodes.gone);
    expect((await visitor.post(`/api/notebooks/${id}/restore`)).status).toBe(204);
    const again = await openLive(server, lead, id);
    expect(cellText(again.doc, 'n')?.toString()).toBe('A -> B');
  });
});
