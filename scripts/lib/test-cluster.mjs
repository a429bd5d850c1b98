import { join } from 'node:path';
import { addresses, startCluster, stopCluster } from './cluster.mjs';
import { needPostgres } from './debian.mjs';
import { takeLock } from './lock.mjs';
import { dataPath } from './place.mjs';
import { Complaint } from './words.mjs';

/** Data of tests may be lost with the machine: no waiting for the disk. */
const settings = ['fsync = off', 'synchronous_commit = off', 'full_page_writes = off'];

/**
 * The cluster that tests use, apart from the application's. Test runs share it; the last one to leave stops it.
 * @returns {Promise<{ owner: string, application: string, release(): Promise<void> }>} addresses of its database
 *   `postgres`
 */
export async function useTestCluster() {
  const home = dataPath('test');
  const programs = needPostgres();
  const starting = await takeLock(join(home, 'start.lock'), { wait: 90 });
  if (starting === null)
    throw new Complaint('The cluster for tests is being started by somebody else, for too long.');
  const use = await takeLock(join(home, 'use.lock'), { shared: true, wait: 90 });
  try {
    const cluster = await startCluster(home, { programs, settings });
    return { ...addresses(cluster, 'postgres'), release: () => leave(use, home, cluster.folder, programs) };
  } finally {
    await starting.release();
  }
}

async function leave(use, home, folder, programs) {
  await use.release();
  const starting = await takeLock(join(home, 'start.lock'), { wait: 10 });
  const alone = await takeLock(join(home, 'use.lock'));
  if (alone !== null) stopCluster(folder, programs);
  await alone?.release();
  await starting?.release();
}
