import type { CellJob } from '@stillroom/shared/cells';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { RunQueue } from '../../../../packages/server/src/modules/compute/queue.ts';
import { buildGroup, buildPerson } from '../../../support/build.ts';
import { startTestServer, type TestServer } from '../../../support/server.ts';

/** A server that only serves: what is queued stays queued. */
let server: TestServer;
let queue: RunQueue;
let one: string;
let two: string;

beforeAll(async () => {
  server = await startTestServer({ PROCESS: 'server' });
  queue = new RunQueue(server.services.database);
  const lead = await buildPerson(server);
  one = (await buildGroup(server, lead)).id;
  two = (await buildGroup(server, lead)).id;
});
afterEach(() => server.sql('with runs as (delete from cell_run) delete from graphile_worker._private_jobs'));
afterAll(() => server.stop());

const job = (name: string): CellJob => ({
  digest: `sha256:${name}`,
  kind: 'trajectory',
  text: '',
  settings: {},
  inputs: { yeast: { kind: 'network', digest: 'sha256:y', text: 'A -> B', result: { large: true } } },
});
const submit = (name: string, group: string) =>
  queue.submit(job(name), { group, notebook: crypto.randomUUID(), name });
/** Names in the order in which the queue would serve them. */
const line = async () =>
  (
    await server.sql<{ key: string }>(
      'select key from graphile_worker.jobs where key is not null order by priority, run_at, id',
    )
  ).map(({ key }) => key.replace('sha256:', ''));

describe('the queue', () => {
  test('holds one run for a digest, however often it is asked for', async () => {
    await Promise.all([submit('a', one), submit('a', two), submit('a', one)]);
    expect(await line()).toEqual(['a']);
    expect(await server.sql('select 1 from cell_run')).toHaveLength(1);
  });

  test('lets groups take turns: many runs of one do not push back the first of another', async () => {
    for (const name of ['a1', 'a2', 'a3', 'a4']) await submit(name, one);
    for (const name of ['b1', 'b2']) await submit(name, two);
    expect(await line()).toEqual(['a1', 'b1', 'a2', 'b2', 'a3', 'a4']);
  });

  test('lets nobody wait for ever: a group that keeps asking comes after what waits already', async () => {
    for (const name of ['a1', 'a2', 'a3']) await submit(name, one);
    await queue.begin('sha256:a1', 'host');
    await server.sql(`delete from cell_run where digest = 'sha256:a1'`);
    await submit('b1', two);
    await submit('b2', two);
    await submit('b3', two);
    const waiting = (await line()).filter((name) => name !== 'a1');
    expect(waiting.indexOf('a3')).toBeLessThan(waiting.indexOf('b3'));
  });

  test('takes a waiting run out when it is not needed, and says why when it was stopped', async () => {
    await submit('gone', one);
    await queue.end('sha256:gone', 'unwanted');
    expect(await line()).toEqual([]);
    expect(await queue.begin('sha256:gone', 'host')).toBe(false);
    await submit('stopped', one);
    await queue.end('sha256:stopped', 'stop');
    expect(await line()).toEqual([]);
    const [attempt] = await server.sql<{ error: { message: string } }>(
      `select error from cell_attempt where digest = 'sha256:stopped'`,
    );
    expect(attempt?.error.message).toContain('Stopped');
  });

  test('leaves the results of inputs out; they are read again where the run is', async () => {
    await submit('a', one);
    const [row] = await server.sql<{ payload: { job: CellJob; results: string[] } }>(
      `select payload from graphile_worker._private_jobs where key = 'sha256:a'`,
    );
    expect(row?.payload.results).toEqual(['yeast']);
    expect(row?.payload.job.inputs['yeast']).toEqual({ kind: 'network', digest: 'sha256:y', text: 'A -> B' });
  });

  test('takes out runs of processes that are no more, and no others', async () => {
    await submit('dead', one);
    await queue.begin('sha256:dead', 'stillroom engine of long ago');
    await submit('waiting', one);
    await queue.sweep();
    const left = await server.sql<{ digest: string }>('select digest from cell_run');
    expect(left.map(({ digest }) => digest)).toEqual(['sha256:waiting']);
  });

  test('counts the time of a run for its group', async () => {
    await submit('a', one);
    const outcome = { status: 'ok', result: 1, resultDigest: 'sha256:1', warnings: [], keep: true } as const;
    await queue.finish(job('a'), outcome, '1', 1500);
    await submit('b', one);
    await queue.finish(job('b'), outcome, '1', 500);
    expect(await server.sql('select seconds, runs from compute_use where "group" = $1', [one])).toEqual([
      { seconds: 2, runs: 2 },
    ]);
    expect(await server.sql(`select result from cell_result where digest = 'sha256:a'`)).toEqual([
      { result: '1' },
    ]);
  });

  test('keeps with a failure what the cell left before it failed', async () => {
    await submit('f', one);
    const outcome = { status: 'failed', error: { message: 'no' }, warnings: [], keep: true } as const;
    const left = '{"printed":["one"],"value":null}';
    await queue.finish(job('f'), { ...outcome, result: JSON.parse(left) as unknown }, left, 10);
    expect(
      await server.sql(`select result, result_digest from cell_result where digest = 'sha256:f'`),
    ).toEqual([{ result: left, result_digest: null }]);
  });
});

test('a run’s words are told as far as news may hold them, whatever they are', async () => {
  const heard: (string | null)[] = [];
  const unlisten = server.services.events.on('run.moved', ({ words }) => heard.push(words));
  const since = new Date().toISOString();
  await queue.move('sha256:m', since, 0.5, 'half way');
  for (const sign of ['x', '水', '\u0001', '😀'])
    await queue.move('sha256:m', since, null, sign.repeat(9000));
  await queue.move('sha256:m', since, 1, null);
  await expect.poll(() => heard.length).toBe(6);
  unlisten();
  expect([heard[0], heard[5]]).toEqual(['half way', null]);
  for (const words of heard.slice(1, 5)) {
    expect(words).toMatch(/…$/u);
    // No sign is cut in two.
    expect(words).not.toMatch(/\p{Surrogate}/u);
  }
});
