import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { expect, test } from 'vitest';
import { findProgram } from '../../../scripts/lib/debian.mjs';
import { needSpace } from '../../../scripts/lib/disk.mjs';
import { missingPackages } from '../../../scripts/lib/npm.mjs';
import { freePort, tryPort } from '../../../scripts/lib/port.mjs';

test('a full disk is told in one sentence, with how much is needed', () => {
  expect(() => needSpace(tmpdir(), 1)).not.toThrow();
  expect(() => needSpace(tmpdir(), 1e9)).toThrow(/is full: \d+ MB are free and 1000000000 MB are needed/u);
});

test('a taken port is known before anything is started', async () => {
  const port = await freePort();
  expect(await tryPort(port, '127.0.0.1')).toBeNull();
  const taken = createServer().listen(port, '127.0.0.1');
  await new Promise((resolve) => taken.once('listening', resolve));
  expect(await tryPort(port, '127.0.0.1')).toBe('EADDRINUSE');
  await new Promise((resolve) => taken.close(resolve));
});

test('every package of the lock file is there, or it would be installed now', () => {
  expect(missingPackages()).toBe(0);
});

test('programs are looked for by name, first come first taken', () => {
  expect(findProgram('no-such-program')).toBeNull();
  expect(findProgram('no-such-program', 'sh')).toMatch(/\/sh$/u);
});
