import { randomBytes } from 'node:crypto';
import { chmodSync, chownSync, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { canEnter, databaseAccount } from './account.mjs';
import { stateFolder } from './place.mjs';
import { clearStalePid, readPostmaster } from './postmaster.mjs';
import { freePort } from './port.mjs';
import { runQuietly, tail } from './run.mjs';
import { Complaint, say } from './words.mjs';

/**
 * A PostgreSQL cluster of the project's own, on loopback, with passwords.
 * @typedef {{ folder: string, port: number, ownerPassword: string, applicationPassword: string }} Cluster
 */

const owner = 'stillroom';
const application = 'stillroom_app';

/**
 * Makes the cluster where there is none, starts it where it does not run. The caller holds the lock of the folder.
 * @param {string} home folder for the cluster and its secrets
 * @param {{ programs: string, settings?: string[] }} options `programs`: the folder of PostgreSQL's
 * @returns {Promise<Cluster>}
 */
export async function startCluster(home, { programs, settings = [] }) {
  const account = databaseAccount();
  const place = choosePlace(home, account);
  const folder = join(place, 'postgres');
  const secrets = readSecrets(home);
  if (!existsSync(join(folder, 'made'))) {
    say('Making the database cluster …');
    makeCluster(folder, { programs, account, password: secrets.ownerPassword, settings });
  }
  const running = readPostmaster(folder);
  const port = running?.port ?? (await startPostgres(folder, programs, account));
  const cluster = { folder, port, ...secrets };
  makeApplicationRole(cluster, programs);
  return cluster;
}

/** Stops it: open connections are ended, what is committed stays. */
export function stopCluster(folder, programs) {
  return runQuietly(join(programs, 'pg_ctl'), ['stop', '-D', folder, '-m', 'fast', '-w', '-t', '60'], {
    ...databaseAccount(),
    cwd: '/',
  }).ok;
}

/** The addresses of a database of the cluster: for its owner and for the application. */
export function addresses({ port, ownerPassword, applicationPassword }, database) {
  const at = `127.0.0.1:${port}/${database}`;
  return {
    owner: `postgres://${owner}:${ownerPassword}@${at}`,
    application: `postgres://${application}:${applicationPassword}@${at}`,
  };
}

/** Makes a database where it is missing. */
export function needDatabase(cluster, programs, name) {
  const known = query(cluster, programs, `select 1 from pg_database where datname = '${name}'`);
  if (known.trim() !== '1') query(cluster, programs, `create database "${name}"`);
}

function choosePlace(home, account) {
  if (canEnter(account, home)) return home;
  const fallback = stateFolder(home);
  mkdirSync(fallback, { recursive: true, mode: 0o755 });
  if (!existsSync(join(fallback, 'postgres'))) {
    say(`The database account cannot enter ${home}; the cluster is kept in ${fallback}.`);
  }
  return fallback;
}

function readSecrets(home) {
  const file = join(home, 'secrets.json');
  if (existsSync(file)) return JSON.parse(readFileSync(file, 'utf8'));
  const secrets = {
    ownerPassword: randomBytes(24).toString('base64url'),
    applicationPassword: randomBytes(24).toString('base64url'),
    sessionSecret: randomBytes(48).toString('base64url'),
  };
  writeFileSync(file, `${JSON.stringify(secrets, null, 2)}\n`, { mode: 0o600 });
  return secrets;
}

function makeCluster(folder, { programs, account, password, settings }) {
  // Without the file "made" an earlier attempt was cut short: what it left is worth nothing.
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const passwordFile = `${folder}.password`;
  writeFileSync(passwordFile, password, { mode: 0o600 });
  give(folder, account);
  give(passwordFile, account);
  const options = ['-D', folder, '-U', owner, '-A', 'scram-sha-256', `--pwfile=${passwordFile}`];
  const locale = ['--locale=C.UTF-8', '-E', 'UTF8', '--data-checksums'];
  const { ok, output } = runQuietly(join(programs, 'initdb'), [...options, ...locale], {
    ...account,
    cwd: '/',
  });
  rmSync(passwordFile, { force: true });
  if (!ok) throw new Complaint(clusterWords('made', output));
  const lines = [
    `listen_addresses = '127.0.0.1'`,
    `unix_socket_directories = ''`,
    `max_connections = 200`,
    ...settings,
  ];
  writeFileSync(join(folder, 'postgresql.auto.conf'), `${lines.join('\n')}\n`);
  give(join(folder, 'postgresql.auto.conf'), account);
  writeFileSync(join(folder, 'made'), '');
}

async function startPostgres(folder, programs, account) {
  await clearStalePid(folder);
  let last = '';
  for (let attempt = 0; attempt < 4; attempt += 1) {
    const port = await freePort();
    const log = join(folder, 'log.txt');
    const args = ['start', '-D', folder, '-l', log, '-w', '-t', '60', '-o', `-p ${port}`];
    const { ok, output } = runQuietly(join(programs, 'pg_ctl'), args, {
      ...account,
      cwd: '/',
      detached: true,
    });
    if (ok) return port;
    last = `${output}\n${existsSync(log) ? readFileSync(log, 'utf8') : ''}`;
    // Another program may have taken the port between asking for it and using it: only that is worth another try.
    if (!/could not bind|Address already in use/iu.test(last)) break;
  }
  throw new Complaint(clusterWords('started', last));
}

function makeApplicationRole(cluster, programs) {
  const known = query(cluster, programs, `select 1 from pg_roles where rolname = '${application}'`);
  if (known.trim() === '1') return;
  query(cluster, programs, `create role ${application} login password '${cluster.applicationPassword}'`);
}

/** Runs one statement as owner. Only for what comes before there is a database to migrate. */
export function query({ port, ownerPassword }, programs, sql) {
  const args = [
    '-h',
    '127.0.0.1',
    '-p',
    String(port),
    '-U',
    owner,
    '-d',
    'postgres',
    '-X',
    '-A',
    '-t',
    '-v',
    'ON_ERROR_STOP=1',
    '-c',
    sql,
  ];
  const { ok, output } = runQuietly(join(programs, 'psql'), args, {
    env: { ...process.env, PGPASSWORD: ownerPassword },
  });
  if (!ok) throw new Complaint(`The database refused a statement:\n${tail(output)}`);
  return output;
}

function give(path, { uid, gid }) {
  if (uid !== undefined) chownSync(path, uid, gid);
  else chmodSync(path, path.endsWith('.password') || path.endsWith('.conf') ? 0o600 : 0o700);
}

function clusterWords(what, output) {
  if (/No space left on device/iu.test(output)) {
    return 'The disk is full, and the database needs room. Free some space, then start again; nothing was lost.';
  }
  return `The database cluster could not be ${what}:\n${tail(output)}`;
}
