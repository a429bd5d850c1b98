import { type ChildProcess, spawn } from 'node:child_process';
import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, afterEach, beforeAll, describe, expect, test, vi } from 'vitest';

/** `npm start` as people meet it: from a fresh data folder, beside itself, after a crash. */
const script = fileURLToPath(new URL('../../scripts/start.mjs', import.meta.url));
const data = mkdtempSync(join(tmpdir(), 'stillroom-'));
// The database has an account of its own when root runs this.
chmodSync(data, 0o755);
let port = 0;

interface Run {
  readonly child: ChildProcess;
  said(): string;
  readonly ended: Promise<number | null>;
}

/** Runs of the present test; one that fails must not leave its own running for the next. */
const running = new Set<Run>();

function start(): Run {
  const env = { ...process.env, DATA_FOLDER: data, PORT: String(port), COMPUTE_WORKERS: '1' };
  const child = spawn(process.execPath, [script], { env, stdio: ['ignore', 'pipe', 'pipe'] });
  let words = '';
  child.stdout.on('data', (chunk: Buffer) => (words += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (words += chunk.toString()));
  const ended = new Promise<number | null>((resolve) => child.on('close', resolve));
  const run = { child, said: () => words, ended };
  running.add(run);
  return run;
}

const ready = (run: Run) =>
  vi.waitFor(() => expect(run.said()).toContain('Stillroom is ready at'), { timeout: 150_000, interval: 50 });

async function stop(run: Run): Promise<void> {
  run.child.kill('SIGINT');
  expect(await run.ended).toBe(0);
}

const isUp = () =>
  fetch(`http://127.0.0.1:${port}/api/session`).then(
    ({ ok }) => ok,
    () => false,
  );

beforeAll(async () => {
  const probe = createServer().listen(0, '127.0.0.1');
  await new Promise((resolve) => probe.once('listening', resolve));
  port = (probe.address() as AddressInfo).port;
  await new Promise((resolve) => probe.close(resolve));
});
afterEach(async () => {
  for (const { child, ended } of running) {
    if (child.exitCode === null && child.signalCode === null) child.kill('SIGINT');
    await ended;
  }
  running.clear();
});
afterAll(() => rmSync(data, { recursive: true, force: true }));

describe('npm start', () => {
  test('makes all it needs, says where it is and who may enter, and stops cleanly', async () => {
    const run = start();
    await ready(run);
    expect(run.said()).toContain(`http://localhost:${port}`);
    for (const role of ['lead', 'author', 'remarker', 'reader', 'operator', 'reviewer']) {
      expect(run.said()).toMatch(new RegExp(`^ +${role} `, 'mu'));
    }
    expect(await isUp()).toBe(true);
    await stop(run);
    expect(run.said()).toContain('Everything is kept.');
    expect(await isUp()).toBe(false);
  }, 180_000);

  test('beside a running one says so in one sentence and leaves it alone', async () => {
    const first = start();
    await ready(first);
    const second = start();
    expect(await second.ended).toBe(0);
    expect(second.said()).toMatch(
      /^Stillroom runs already at http:\/\/localhost:\d+ \(process \d+\); one is enough\.$/mu,
    );
    expect(await isUp()).toBe(true);
    await stop(first);
  }, 120_000);

  test('starts again after kill -9, with what was left running', async () => {
    const first = start();
    await ready(first);
    first.child.kill('SIGKILL');
    await first.ended;
    await vi.waitFor(async () => expect(await isUp()).toBe(false), { timeout: 20_000, interval: 100 });
    const second = start();
    await ready(second);
    expect(await isUp()).toBe(true);
    await stop(second);
  }, 180_000);

  test('a taken port is one sentence with a way out', async () => {
    const other = createServer().listen(port, '127.0.0.1');
    await new Promise((resolve) => other.once('listening', resolve));
    const run = start();
    expect(await run.ended).toBe(1);
    expect(run.said().trim()).toBe(
      `Port ${port} is taken by another program; choose another one: PORT=${port + 1} npm start`,
    );
    await new Promise((resolve) => other.close(resolve));
  }, 60_000);
});
