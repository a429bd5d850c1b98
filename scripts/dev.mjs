// npm run dev: the server from its sources, restarted on change, and the pages from vite; on the data of npm start.
import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { buildStale } from './lib/build.mjs';
import { migrateDatabase, openDatabase, runningNote, serverEnvironment } from './lib/installation.mjs';
import { takeLock } from './lib/lock.mjs';
import { needNode } from './lib/node-version.mjs';
import { needNpmPackages } from './lib/npm.mjs';
import { dataPath, root } from './lib/place.mjs';
import { bin } from './lib/run.mjs';
import { stopSignal } from './lib/stop-signals.mjs';
import { Complaint, main, say } from './lib/words.mjs';

const port = process.env.PORT || '7070';
const pagesPort = process.env.PAGES_PORT || '5173';
const address = `http://localhost:${pagesPort}`;

await main(async () => {
  needNode();
  const lock = await takeLock(join(dataPath(), 'running.lock'));
  if (lock === null)
    throw new Complaint('Stillroom runs already; stop it first, since both use the same data.');
  const signal = stopSignal();
  needNpmPackages();
  buildStale(['server', 'worker']);
  const database = await openDatabase();
  try {
    migrateDatabase(database.env);
    const env = {
      DEMO: '1',
      ...serverEnvironment(database.env),
      PORT: port,
      PUBLIC_URL: address,
    };
    const tsx = [
      'watch',
      '--conditions=development',
      '--tsconfig',
      'tsconfig.base.json',
      'packages/server/src/main.ts',
    ];
    const server = start([bin('tsx/dist/cli.mjs'), ...tsx], env);
    const pages = start([bin('vite/bin/vite.js'), 'packages/client', '--port', pagesPort, '--strictPort'], {
      ...process.env,
      STILLROOM_SERVER: `http://127.0.0.1:${port}`,
    });
    say(`The pages are at ${address}; Ctrl-C stops everything.`);
    const ended = [server, pages].map(
      (child) => new Promise((resolve) => child.on('close', () => resolve(child))),
    );
    const first = await Promise.race([signal, ...ended]);
    await Promise.all([server, pages].map(end));
    if (typeof first !== 'string')
      throw new Complaint('One of the two ended by itself; its last words are above.');
  } finally {
    database.stop();
    runningNote.remove();
    await lock.release();
  }
});

function start(args, env) {
  return spawn(process.execPath, args, {
    cwd: root,
    env,
    stdio: ['ignore', 'inherit', 'inherit'],
    detached: true,
  });
}

function end(child) {
  return new Promise((resolve) => {
    if (child.exitCode !== null || child.signalCode !== null) return resolve();
    child.on('close', resolve);
    child.kill('SIGTERM');
  });
}
