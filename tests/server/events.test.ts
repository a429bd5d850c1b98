import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, test, vi } from 'vitest';
import { announce, createEvents, type Events } from '../../packages/server/src/events.ts';
import { createLogger } from '../../packages/server/src/logger.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
/** As another process would hear them. */
let elsewhere: Events;
beforeAll(async () => {
  server = await startTestServer();
  elsewhere = createEvents(
    server.database.url,
    createLogger('error', () => undefined),
  );
  await elsewhere.start();
});
afterAll(async () => {
  await elsewhere.stop();
  await server.stop();
});

test('an event reaches every process once its transaction is committed, not before', async () => {
  const heard: string[] = [];
  const silence = [server.services.events, elsewhere].map((events, index) =>
    events.on('notebook.changed', ({ notebook }) => heard.push(`${index} ${notebook}`)),
  );
  const notebook = randomUUID();
  const { database } = server.services;
  await database.transaction(async (manager) => {
    await announce(manager, 'notebook.changed', { notebook });
    await announce(database.manager, 'mail.queued', {});
    expect(heard).toEqual([]);
  });
  await vi.waitFor(() => expect(heard.sort()).toEqual([`0 ${notebook}`, `1 ${notebook}`]));
  silence.forEach((stop) => stop());
});

test('an event of a transaction that is rolled back is never heard', async () => {
  const heard: string[] = [];
  const silence = elsewhere.on('notebook.changed', ({ notebook }) => heard.push(notebook));
  const { database } = server.services;
  const undone = database.transaction(async (manager) => {
    await announce(manager, 'notebook.changed', { notebook: 'undone' });
    throw new Error('no');
  });
  await expect(undone).rejects.toThrow('no');
  await announce(database.manager, 'notebook.changed', { notebook: 'done' });
  await vi.waitFor(() => expect(heard).toEqual(['done']));
  silence();
});

test('a listener that fails does not keep others from hearing', async () => {
  const heard: string[] = [];
  const silence = [
    elsewhere.on('notebook.changed', () => {
      throw new Error('a bad listener');
    }),
    elsewhere.on('notebook.changed', ({ notebook }) => heard.push(notebook)),
  ];
  await announce(server.services.database.manager, 'notebook.changed', { notebook: 'one' });
  await vi.waitFor(() => expect(heard).toEqual(['one']));
  silence.forEach((stop) => stop());
});

test('a lost line comes back by itself, tells of the gap, and hears again', async () => {
  let gaps = 0;
  const heard: string[] = [];
  const silence = [
    elsewhere.onGap(() => (gaps += 1)),
    elsewhere.on('notebook.changed', ({ notebook }) => heard.push(notebook)),
  ];
  await server.sql(
    `select pg_terminate_backend(pid) from pg_stat_activity where query like 'listen %' and datname = current_database()`,
  );
  await vi.waitFor(() => expect(gaps).toBe(1), { timeout: 20_000 });
  await announce(server.services.database.manager, 'notebook.changed', { notebook: 'after' });
  await vi.waitFor(() => expect(heard).toEqual(['after']));
  silence.forEach((stop) => stop());
});
