import { spawn } from 'node:child_process';
import { root } from './place.mjs';
import { Complaint } from './words.mjs';

/**
 * Starts a server process and waits until it answers.
 * @returns {Promise<{ port: number | null, demo: object | null, ended: Promise<number>, stop(): Promise<void> }>}
 */
export function startServerProcess(env, nodeArguments = ['packages/server/dist/main.js']) {
  const child = spawn(process.execPath, nodeArguments, {
    cwd: root,
    env,
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    // In a group of its own: Ctrl-C reaches only us, and we stop it in order. It ends by itself when we are gone.
    detached: true,
  });
  const ended = new Promise((resolve) => child.on('close', (status) => resolve(status ?? 1)));
  const stop = async () => {
    if (child.exitCode === null && child.signalCode === null) child.kill('SIGTERM');
    const patience = setTimeout(() => child.kill('SIGKILL'), 10_000);
    await ended;
    clearTimeout(patience);
  };
  return new Promise((resolve, reject) => {
    child.on('error', reject);
    child.on('message', (message) => {
      if (message.ready) resolve({ port: message.port, demo: message.demo ?? null, ended, stop });
    });
    // What went wrong it has said already, on our standard error.
    ended.then(() => reject(new Complaint('The server did not start.')));
  });
}
