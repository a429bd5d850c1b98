import { existsSync, readdirSync, readFileSync, readlinkSync, realpathSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { Complaint } from './words.mjs';

/** The running server of a cluster folder as its lock file tells, or null where it does not run. */
export function readPostmaster(folder) {
  const lines = readPidFile(folder);
  if (lines === null || lines[7]?.trim() !== 'ready') return null;
  const pid = Number(lines[0]);
  return processesIn(folder).includes(pid) ? { pid, port: Number(lines[3]) } : null;
}

/**
 * After a kill -9 PostgreSQL finds its own lock file and may refuse to start: the dead server can stay a zombie, or
 * its process id belong to somebody else by now. The file may go only when no process works in the folder any more:
 * the orphaned ones leave within seconds, and deleting it earlier would risk the data.
 */
export async function clearStalePid(folder) {
  const lines = readPidFile(folder);
  if (lines === null) return;
  for (let waited = 0; processesIn(folder).length > 0; waited += 100) {
    if (waited > 30_000) {
      throw new Complaint(
        `Processes of an earlier database still work in ${folder}; end them, then start again.`,
      );
    }
    await pause(100);
  }
  if (!isPostgres(Number(lines[0]), folder)) rmSync(join(folder, 'postmaster.pid'), { force: true });
}

function readPidFile(folder) {
  const file = join(folder, 'postmaster.pid');
  return existsSync(file) ? readFileSync(file, 'utf8').split('\n') : null;
}

/** Ids of the processes whose working folder is the cluster's: every PostgreSQL process, no zombie. */
function processesIn(folder) {
  const real = realpathSync(folder);
  return readdirSync('/proc')
    .filter((name) => /^\d+$/u.test(name))
    .filter((name) => linkOf(`/proc/${name}/cwd`) === real)
    .map(Number);
}

function isPostgres(pid, folder) {
  try {
    return (
      readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes('postgres') &&
      linkOf(`/proc/${pid}/cwd`) === realpathSync(folder)
    );
  } catch {
    return false;
  }
}

function linkOf(path) {
  try {
    return readlinkSync(path);
  } catch {
    return null;
  }
}
