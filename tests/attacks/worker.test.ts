import { createServer, type Server } from 'node:net';
import { fileURLToPath } from 'node:url';
import { EngineProcess, findIsolation } from '@stillroom/kernel/worker';
import { createPool, type Pool } from '../../packages/server/src/modules/compute/pool/index.ts';
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest';
import { jobOf } from '../support/cell-jobs.ts';
import '../support/engine.ts';

const probeFolder = fileURLToPath(new URL('probe', import.meta.url));
const megabyte = 1024 * 1024;

describe('an engine process reaches nothing', () => {
  let server: Server;
  let port = 0;
  let connections = 0;

  beforeAll(async () => {
    process.env['SECRET'] = 'of the host';
    server = createServer(() => connections++);
    await new Promise<void>((resolve) => server.listen(0, resolve));
    const address = server.address();
    port = typeof address === 'object' && address !== null ? address.port : 0;
  });
  afterAll(() => void server.close());

  test('no network, files, programs, threads, source, secrets; only so much memory', async () => {
    const { command, whole } = await findIsolation({ folder: probeFolder, memory: 900 * megabyte });
    expect(whole).toBe(true);
    const engine = await EngineProcess.start(command);
    const outcome = await engine.run(jobOf('script', '', {}, { port }), { deadline: 20 });
    engine.kill();
    if (outcome.status === 'failed') throw new Error(outcome.error.message);
    const reached = Object.entries(outcome.result as Record<string, string>).filter(
      ([, how]) => how === 'reached',
    );
    expect(reached).toEqual([]);
    expect(connections).toBe(0);
  });

  test('the same attempts reach what is there when nothing confines them', async () => {
    const { command } = await findIsolation({ folder: probeFolder, memory: 900 * megabyte });
    const bare = { ...command, program: process.execPath, args: [`${probeFolder}/worker.mjs`] };
    const engine = await EngineProcess.start(bare);
    const job = jobOf('script', '', {}, { port, buffers: 1 });
    const outcome = await engine.run(job, { deadline: 20 });
    engine.kill();
    expect(outcome).toMatchObject({
      result: { loopback: 'reached', accounts: 'reached', program: 'reached' },
    });
    expect(connections).toBeGreaterThan(0);
  });

  test('the port of the database is out of reach', async () => {
    const database = new URL(inject('cluster').application);
    const { command } = await findIsolation({ folder: probeFolder, memory: 900 * megabyte });
    const engine = await EngineProcess.start(command);
    const outcome = await engine.run(jobOf('script', '', {}, { port: Number(database.port) }), {
      deadline: 20,
    });
    engine.kill();
    expect(outcome).toMatchObject({ result: { loopback: expect.not.stringMatching('reached') as string } });
  });
});

describe('a run that takes too much ends alone', () => {
  let pool: Pool;
  beforeAll(() => {
    pool = createPool({ size: 2, memory: 320 * megabyte });
  });
  afterAll(() => pool.close());

  test('too much memory fails its own cell in words, and the next runs go on', async () => {
    const bomb = jobOf('network', '[i = 1..1000000] X[i] <=> X[i + 1] | p[i], q[i]');
    const beside = Array.from({ length: 20 }, (_, n) =>
      pool.run(jobOf('claim', `${n} == ${n}`), { deadline: 30 }),
    );
    const outcome = await pool.run(bomb, { deadline: 60 });
    expect(outcome).toMatchObject({ status: 'failed', keep: false });
    expect(outcome.status === 'failed' && outcome.error.message).toContain('memory');
    expect((await Promise.all(beside)).every(({ status }) => status === 'ok')).toBe(true);
    expect(await pool.run(jobOf('claim', '1 == 1'), { deadline: 10 })).toMatchObject({ status: 'ok' });
  });
});
