import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { addresses, needDatabase, startCluster, stopCluster } from './cluster.mjs';
import { needPostgres } from './debian.mjs';
import { dataPath } from './place.mjs';
import { readPostmaster } from './postmaster.mjs';
import { runQuietly, tail } from './run.mjs';
import { Complaint, say } from './words.mjs';

/**
 * The database of this installation, started: our own cluster, or the one DATABASE_URL names.
 * @returns {Promise<{ env: Record<string, string>, programs: string | null, stop(): void }>} `env` for server processes
 */
export async function openDatabase() {
  if (process.env.DATABASE_URL) {
    say('Using the database that DATABASE_URL names.');
    return { env: {}, programs: null, stop() {} };
  }
  const programs = needPostgres();
  const cluster = await startCluster(dataPath('cluster'), { programs });
  needDatabase(cluster, programs, 'stillroom');
  const { owner, application } = addresses(cluster, 'stillroom');
  writeFileSync(noteFile(), JSON.stringify({ folder: cluster.folder }), { mode: 0o600 });
  return {
    programs,
    env: {
      DATABASE_URL: application,
      DATABASE_OWNER_URL: owner,
      ...(process.env.SESSION_SECRET ? {} : { SESSION_SECRET: cluster.sessionSecret }),
    },
    stop: () => void stopCluster(cluster.folder, programs),
  };
}

/** The settings of the installation that runs already, for more processes beside it. @throws Complaint when none does. */
export function joinDatabase() {
  if (process.env.DATABASE_URL) return {};
  const note = existsSync(noteFile()) ? JSON.parse(readFileSync(noteFile(), 'utf8')) : null;
  const running = note === null ? null : readPostmaster(note.folder);
  if (running === null) {
    throw new Complaint(
      'The database of this installation does not run; start it with npm start, or set DATABASE_URL.',
    );
  }
  const secrets = JSON.parse(readFileSync(join(dataPath('cluster'), 'secrets.json'), 'utf8'));
  const { owner, application } = addresses({ port: running.port, ...secrets }, 'stillroom');
  return {
    DATABASE_URL: application,
    DATABASE_OWNER_URL: owner,
    SESSION_SECRET: process.env.SESSION_SECRET || secrets.sessionSecret,
  };
}

/** Migrates the database; quick when nothing is to be done. */
export function migrateDatabase(env) {
  const { ok, output } = runQuietly(process.execPath, ['packages/server/dist/prepare.js'], {
    env: { ...process.env, ...env },
  });
  if (!ok) throw new Complaint(`The database could not be brought up to date:\n${tail(output)}`);
  if (!output.includes('up to date')) say(output.trim());
}

/** What a process that serves is told beside our own environment; never the owner's address. */
export function serverEnvironment(env) {
  const { DATABASE_OWNER_URL: _owner, ...rest } = { ...process.env, ...env };
  return rest;
}

/** The note by which a second start finds the first. */
export const runningNote = {
  read() {
    const file = join(dataPath(), 'running.json');
    return existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : null;
  },
  write(note) {
    writeFileSync(join(dataPath(), 'running.json'), JSON.stringify(note));
  },
  remove() {
    rmSync(join(dataPath(), 'running.json'), { force: true });
  },
};

const noteFile = () => join(dataPath(), 'cluster', 'where.json');
