import { spawn, spawnSync } from 'node:child_process';
import { root } from './place.mjs';

/**
 * Runs a program to its end, quietly: what it said is in the result.
 * @returns {{ ok: boolean, status: number | null, output: string, missing: boolean }}
 */
export function runQuietly(command, args, options = {}) {
  const { status, stdout, stderr, error } = spawnSync(command, args, {
    cwd: root,
    encoding: 'utf8',
    maxBuffer: 64 * 1024 * 1024,
    ...options,
  });
  const output = `${stdout ?? ''}${stderr ?? ''}${error && error.code !== 'ENOENT' ? error.message : ''}`;
  return { ok: status === 0, status, output, missing: error?.code === 'ENOENT' };
}

/** Runs a program to its end with its words on our terminal. @returns its exit status; 130 when it was interrupted. */
export function runLoudly(command, args, options = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd: root, stdio: 'inherit', ...options });
    child.on('error', reject);
    child.on('close', (status, signal) => resolve(status ?? (signal === 'SIGINT' ? 130 : 1)));
  });
}

/** Path of a program that an npm package brings, to be run by this very Node. */
export const bin = (file) => `${root}/node_modules/${file}`;

/** The last lines of a long output, for a complaint. */
export const tail = (output, lines = 12) => output.trim().split('\n').slice(-lines).join('\n');
