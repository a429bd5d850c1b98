// npm start: makes everything that is missing, then runs Stillroom until Ctrl-C. Uses only Node's own modules.
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { buildStale } from './lib/build.mjs';
import { needSpace } from './lib/disk.mjs';
import { migrateDatabase, openDatabase, runningNote, serverEnvironment } from './lib/installation.mjs';
import { takeLock } from './lib/lock.mjs';
import { needNode } from './lib/node-version.mjs';
import { needNpmPackages } from './lib/npm.mjs';
import { dataPath } from './lib/place.mjs';
import { tryPort } from './lib/port.mjs';
import { startServerProcess } from './lib/server-process.mjs';
import { stopSignal } from './lib/stop-signals.mjs';
import { Complaint, main, say, tell } from './lib/words.mjs';

const host = process.env.HOST || '127.0.0.1';
const port = Number(process.env.PORT || 7070);

await main(async () => {
  needNode();
  const data = dataPath();
  needSpace(data, 300);
  const lock = await takeLock(join(data, 'running.lock'));
  if (lock === null) return tellWhereItRuns();
  const signal = stopSignal();
  try {
    await run(signal);
  } finally {
    runningNote.remove();
    await lock.release();
  }
});

async function run(signal) {
  await needPort();
  needNpmPackages();
  buildStale();
  say('Starting the database …');
  const database = await openDatabase();
  try {
    migrateDatabase(database.env);
    say('Starting the server …');
    const env = { DEMO: usualDemo(), ...serverEnvironment(database.env), HOST: host, PORT: String(port) };
    const server = await startServerProcess(env);
    runningNote.write({ pid: process.pid, port: server.port });
    welcome(server);
    const ending = await Promise.race([signal, server.ended]);
    if (typeof ending === 'string') say('Stopping …');
    await server.stop();
    if (typeof ending === 'number')
      throw new Complaint('The server ended by itself; its last words are above.');
    say('Stopped. Everything is kept.');
  } finally {
    database.stop();
  }
}

async function needPort() {
  const code = await tryPort(port, host);
  if (code === 'EADDRINUSE') {
    throw new Complaint(
      `Port ${port} is taken by another program; choose another one: PORT=${port + 1} npm start`,
    );
  }
  if (code !== null)
    throw new Complaint(`Port ${port} on ${host} cannot be used (${code}); choose another one with PORT=…`);
}

/** Accounts whose passwords everybody knows are for this machine alone, unless DEMO says otherwise. */
function usualDemo() {
  return ['127.0.0.1', '::1', 'localhost'].includes(host) && !process.env.PUBLIC_URL ? '1' : '0';
}

/** Another start has the lock: it runs, or is about to. */
async function tellWhereItRuns() {
  for (let waited = 0; waited < 90; waited += 1) {
    const note = runningNote.read();
    if (note !== null)
      return tell(`Stillroom runs already at ${address(note.port)} (process ${note.pid}); one is enough.`);
    if (waited === 0) say('Another start is under way; waiting for it …');
    await pause(1000);
  }
  throw new Complaint('Another start is under way and does not come to an end; stop it, then start again.');
}

function welcome({ port: at, demo }) {
  const lines = [
    '',
    `Stillroom is ready at ${address(at)}`,
    '',
    ...(demo === null
      ? ['Its first operator is made in another terminal: npm run operator -- name@place.org', '']
      : [...demoLines(demo, at), '']),
    'Ctrl-C stops everything.',
    '',
  ];
  for (const line of lines) tell(line === '' ? '' : `  ${line}`);
}

function demoLines({ accounts, review }, at) {
  const lines = accounts.map(
    ({ role, email, password }) => `  ${role.padEnd(9)} ${email.padEnd(34)} ${password}`,
  );
  if (review !== null) lines.push(`  ${'reviewer'.padEnd(9)} ${address(at)}${review}`);
  return ['Demo accounts:', ...lines];
}

function address(at) {
  const name = ['127.0.0.1', '0.0.0.0', '::'].includes(host) ? 'localhost' : host;
  return process.env.PUBLIC_URL?.replace(/\/+$/u, '') || `http://${name}:${at}`;
}
