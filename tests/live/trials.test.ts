import type { Me } from '@stillroom/shared/contracts';
import { afterAll, afterEach, beforeAll, expect, test } from 'vitest';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell, closeLive, openLive } from '../support/live.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
let ada: Me;
let reader: Me;
let notebook: string;

beforeAll(async () => {
  server = await startTestServer();
  [ada, reader] = [await buildPerson(server), await buildPerson(server)];
  const group = await buildGroup(server, ada);
  await buildMember(server, group, reader, 'reader');
  notebook = await buildNotebook(server, group, ada, [
    cell('decay', 'network', 'A -> B | k = 1 /s\nstart A = 8 uM'),
    cell('run', 'trajectory', '', { settings: { network: 'decay', until: 1, points: 2 } }),
    cell('weighed', 'balance', '', { settings: { network: 'decay' } }),
  ]);
});
afterEach(closeLive);
afterAll(() => server.stop());

const address = (name: string) => `/api/notebooks/${notebook}/cells/${name}/trial`;

test('values are tried without a trace: nobody is told, and the cell stays as it is', async () => {
  const a = await openLive(server, ada, notebook);
  const before = await a.cell('run', ({ state }) => state === 'current', 'current');
  const visitor = await signIn(server, ada);
  const trial = await visitor.post(address('run'), { constants: { k: 2 }, start: { A: 4 } });
  expect(trial.status).toBe(200);
  const { result } = trial.body as { result: { species: { A: number[] } } };
  expect(result.species.A[1]).toBeCloseTo(4 * Math.exp(-2), 5);
  const after = await a.cell('run', ({ state }) => state === 'current', 'current still');
  expect(after).toMatchObject({ digest: before.digest, shown: before.shown });
});

test('values that fit nothing are refused in words', async () => {
  const visitor = await signIn(server, ada);
  const unknown = await visitor.post(address('run'), { constants: { q: 2 } });
  expect(unknown.body).toMatchObject({
    status: 'failed',
    error: { message: expect.stringContaining('q') as unknown },
  });
  const unfit = await visitor.post(address('weighed'), { start: { A: 2 } });
  expect(unfit.body).toMatchObject({ status: 'failed' });
  expect((await visitor.post(address('run'), { constants: { k: 'two' } })).status).toBe(400);
});

test('a reader, who may not run cells, may not try values', async () => {
  const visitor = await signIn(server, reader);
  expect((await visitor.post(address('run'), { constants: { k: 2 } })).status).toBe(403);
});
