import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { addresses, needDatabase, startCluster, stopCluster } from '../../../scripts/lib/cluster.mjs';
import { needPostgres } from '../../../scripts/lib/debian.mjs';
import { stateFolder } from '../../../scripts/lib/place.mjs';
import { readPostmaster } from '../../../scripts/lib/postmaster.mjs';

const home = mkdtempSync(join(tmpdir(), 'cluster-'));
chmodSync(home, 0o755);
const programs = needPostgres();
const options = { programs };

let cluster;
const query = async (url, sql) => {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  return client.query(sql).finally(() => client.end());
};

beforeAll(async () => {
  cluster = await startCluster(home, options);
  needDatabase(cluster, programs, 'kept');
});
afterAll(() => {
  stopCluster(cluster.folder, programs);
  rmSync(home, { recursive: true, force: true });
});

describe('a cluster of our own', () => {
  test('takes the passwords it made, and no other', async () => {
    const { owner, application } = addresses(cluster, 'kept');
    await query(owner, 'create table line (words text)');
    await expect(query(application, 'select 1')).resolves.toMatchObject({ rowCount: 1 });
    const wrong = new URL(owner);
    wrong.password = 'guessed';
    await expect(query(wrong.href, 'select 1')).rejects.toMatchObject({ code: '28P01' });
  });

  test('listens on loopback alone, without a socket file', async () => {
    const { rows } = await query(
      addresses(cluster, 'kept').owner,
      `select name, setting from pg_settings where name in ('listen_addresses', 'unix_socket_directories') order by 1`,
    );
    expect(rows.map(({ setting }) => setting)).toEqual(['127.0.0.1', '']);
  });

  test('keeps its secrets from other accounts', () => {
    expect(statSync(join(home, 'secrets.json')).mode & 0o077).toBe(0);
    expect(statSync(cluster.folder).mode & 0o077).toBe(0);
  });

  test('a second start finds it running', async () => {
    const again = await startCluster(home, options);
    expect(again).toEqual(cluster);
  });

  test('after kill -9 it starts again with everything committed', async () => {
    await query(addresses(cluster, 'kept').owner, `insert into line values ('committed')`);
    const { pid } = readPostmaster(cluster.folder);
    process.kill(pid, 'SIGKILL');
    cluster = await startCluster(home, options);
    const { rows } = await query(addresses(cluster, 'kept').owner, 'select words from line');
    expect(rows).toEqual([{ words: 'committed' }]);
    expect(readPostmaster(cluster.folder).pid).not.toBe(pid);
  });

  test('a lock file that names a process of somebody else does not keep it from starting', async () => {
    stopCluster(cluster.folder, programs);
    const file = join(cluster.folder, 'postmaster.pid');
    writeFileSync(file, `${process.pid}\n${cluster.folder}\n0\n1\n\n127.0.0.1\n\nready\n`);
    cluster = await startCluster(home, options);
    expect(readFileSync(file, 'utf8').split('\n')[0]).not.toBe(String(process.pid));
  });
});

describe.runIf(process.getuid?.() === 0)('a home that the database account may not enter', () => {
  const closed = mkdtempSync(join(tmpdir(), 'closed-'));
  afterAll(() => {
    rmSync(closed, { recursive: true, force: true });
    rmSync(stateFolder(closed), { recursive: true, force: true });
  });

  test('has its cluster in the folder of the system, and its secrets at home', async () => {
    const moved = await startCluster(closed, options);
    try {
      expect(moved.folder).toBe(join(stateFolder(closed), 'postgres'));
      expect(existsSync(join(closed, 'secrets.json'))).toBe(true);
      await expect(query(addresses(moved, 'postgres').owner, 'select 1')).resolves.toBeDefined();
    } finally {
      stopCluster(moved.folder, programs);
    }
  });
});
