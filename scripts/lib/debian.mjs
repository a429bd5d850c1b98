import { accessSync, constants, existsSync, mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { runQuietly, tail } from './run.mjs';
import { Complaint, say } from './words.mjs';

/** First of these programs that the path holds, or null. */
export function findProgram(...names) {
  const folders = (process.env.PATH ?? '').split(delimiter);
  for (const name of names) {
    for (const folder of folders) if (isExecutable(join(folder, name))) return join(folder, name);
  }
  return null;
}

/** The folder with PostgreSQL's own programs, newest version first; installed from Debian where it is missing. */
export function needPostgres() {
  const found = findPostgres();
  if (found !== null) return found;
  keepDebianFromMakingACluster();
  install('PostgreSQL', 'postgresql');
  const now = findPostgres();
  if (now === null)
    throw new Complaint('PostgreSQL was installed, but its programs are nowhere to be found.');
  return now;
}

/** Chromium for the browser tests; installed from Debian where it is missing. */
export function needChromium() {
  const names = ['chromium', 'chromium-browser', 'google-chrome'];
  const found = process.env.CHROMIUM || findProgram(...names);
  if (found) return found;
  install('Chromium', 'chromium');
  return findProgram(...names);
}

function findPostgres() {
  const base = '/usr/lib/postgresql';
  const versions = existsSync(base) ? readdirSync(base).filter((name) => /^\d+$/.test(name)) : [];
  const folders = versions.sort((a, b) => Number(b) - Number(a)).map((version) => join(base, version, 'bin'));
  const onPath = findProgram('initdb');
  if (onPath !== null) folders.push(join(onPath, '..'));
  return (
    folders.find((folder) =>
      ['initdb', 'pg_ctl', 'psql'].every((name) => isExecutable(join(folder, name))),
    ) ?? null
  );
}

/** Debian makes and starts a cluster of its own when the package is installed, unless it is told not to before. */
function keepDebianFromMakingACluster() {
  if (process.getuid?.() !== 0) return;
  const folder = '/etc/postgresql-common/createcluster.d';
  mkdirSync(folder, { recursive: true });
  writeFileSync(join(folder, 'stillroom.conf'), 'create_main_cluster = false\n');
}

function install(what, name) {
  const apt = findProgram('apt-get');
  if (apt === null) {
    throw new Complaint(
      `${what} is not installed and this system has no apt-get; install ${what} by its own means, then start again.`,
    );
  }
  const asRoot = rootPrefix(what, name);
  say(`Installing ${what} from Debian's packages …`);
  const [command, ...rest] = [...asRoot, apt];
  const options = ['-y', '-q', '-o', 'DPkg::Lock::Timeout=120', '--no-install-recommends'];
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const attempt = () => runQuietly(command, [...rest, 'install', ...options, name], { env });
  if (attempt().ok) return;
  // The lists may be old or absent; fetching them takes longer than trying without.
  runQuietly(command, [...rest, 'update', '-q', '-o', 'DPkg::Lock::Timeout=120'], { env });
  const second = attempt();
  if (!second.ok) throw new Complaint(`${what} could not be installed by apt-get:\n${tail(second.output)}`);
}

function rootPrefix(what, name) {
  if (process.getuid?.() === 0) return [];
  if (findProgram('sudo') !== null && runQuietly('sudo', ['-n', 'true']).ok) return ['sudo', '-n'];
  throw new Complaint(
    `${what} is not installed, and only root may install it: run "sudo apt-get install ${name}", then start again.`,
  );
}

function isExecutable(file) {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}
