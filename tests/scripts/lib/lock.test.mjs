import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, expect, test, vi } from 'vitest';
import { takeLock } from '../../../scripts/lib/lock.mjs';

const folder = mkdtempSync(join(tmpdir(), 'lock-'));
afterAll(() => rmSync(folder, { recursive: true }));
const lockModule = fileURLToPath(new URL('../../../scripts/lib/lock.mjs', import.meta.url));

test('one at a time, and the next when it is given back', async () => {
  const file = join(folder, 'alone');
  const first = await takeLock(file);
  expect(first).not.toBeNull();
  expect(await takeLock(file)).toBeNull();
  await first.release();
  const second = await takeLock(file);
  expect(second).not.toBeNull();
  await second.release();
});

test('a waiting taker gets it as soon as it is free', async () => {
  const file = join(folder, 'waiting');
  const first = await takeLock(file);
  const waiting = takeLock(file, { wait: 20 });
  await first.release();
  const second = await waiting;
  expect(second).not.toBeNull();
  await second.release();
});

test('many share it, and the last to leave can take it alone', async () => {
  const file = join(folder, 'shared');
  const [first, second] = [await takeLock(file, { shared: true }), await takeLock(file, { shared: true })];
  expect(second).not.toBeNull();
  await first.release();
  expect(await takeLock(file)).toBeNull();
  await second.release();
  const alone = await takeLock(file);
  expect(alone).not.toBeNull();
  await alone.release();
});

test('a holder that is killed gives it back', async () => {
  const file = join(folder, 'killed');
  const program = `
    const { takeLock } = await import(${JSON.stringify(lockModule)});
    await takeLock(${JSON.stringify(file)});
    console.log('held');
    setInterval(() => {}, 1000);`;
  const holder = spawn(process.execPath, ['--input-type=module', '-e', program]);
  await new Promise((resolve) => holder.stdout.once('data', resolve));
  expect(await takeLock(file)).toBeNull();
  holder.kill('SIGKILL');
  await vi.waitFor(async () => {
    const lock = await takeLock(file);
    expect(lock).not.toBeNull();
    await lock.release();
  }, 10_000);
});
