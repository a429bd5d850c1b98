import { afterAll, beforeAll, expect, test } from 'vitest';
import { openConnections } from '../../../../packages/server/src/database/connections.ts';
import { createLogger } from '../../../../packages/server/src/logger.ts';
import { takeOutOldResults } from '../../../../packages/server/src/modules/compute/retention.ts';
import { buildGroup, buildPerson } from '../../../support/build.ts';
import { buildNotebook } from '../../../support/live.ts';
import { startTestServer, type TestServer } from '../../../support/server.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer({ PROCESS: 'server' });
});
afterAll(() => server.stop());

test('old results go, except those that a notebook shows', async () => {
  const lead = await buildPerson(server);
  const notebook = await buildNotebook(server, await buildGroup(server, lead), lead);
  const keep = (digest: string, days: number) =>
    server.sql(
      `insert into cell_result (digest, kind, engine, result, result_digest, warnings, took, at)
       values ($1, 'network', '1', '{}', 'sha256:r', '[]', 1, now() - make_interval(days => $2))`,
      [digest, days],
    );
  await keep('sha256:old', 90);
  await keep('sha256:young', 3);
  await keep('sha256:present', 90);
  await keep('sha256:shown', 90);
  await server.sql(
    `insert into notebook_cell (notebook, cell, place, kind, name, state, digest, shown)
     values ($1, 'c', 0, 'network', 'c', 'stale', 'sha256:present', 'sha256:shown')`,
    [notebook],
  );
  const log = createLogger('error');
  const connections = openConnections(server.database.url, log, { name: 'test', most: 2, durable: true });
  await takeOutOldResults(connections);
  await connections.end();
  const left = await server.sql<{ digest: string }>('select digest from cell_result order by digest');
  expect(left.map(({ digest }) => digest)).toEqual(['sha256:present', 'sha256:shown', 'sha256:young']);
});
