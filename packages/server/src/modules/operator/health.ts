import { statfs } from 'node:fs/promises';
import { homedir } from 'node:os';
import type { HealthView, QueueView } from '@stillroom/shared/contracts';
import { engineVersion } from '@stillroom/shared/plan';
import type { EntityManager } from 'typeorm';
import type { Config } from '../../config/index.ts';
import { version } from '../../version.ts';
import { readSettings } from '../auth/index.ts';
import { countOutbox } from '../mail/index.ts';

type Line = HealthView['lines'][number];

/** Everything an operator wants to know at a glance; each line is asked anew. */
export async function readHealth(
  manager: EntityManager,
  config: Config,
  queue: QueueView,
): Promise<HealthView> {
  // One after another: within a transaction they share one connection.
  const lines = [
    await databaseLine(manager),
    await connectionsLine(manager),
    await sealLine(manager),
    await mailLine(manager, config),
    engineLine(queue),
    await diskLine(),
    memoryLine(),
  ];
  const { signUp } = await readSettings(manager);
  return { version, engine: engineVersion, lines, signUp };
}

async function databaseLine(manager: EntityManager): Promise<Line> {
  const asked = performance.now();
  const [row] = (await manager.query(
    `select current_setting('server_version') as version,
       pg_size_pretty(pg_database_size(current_database())) as size`,
  )) as [{ version: string; size: string }];
  const took = performance.now() - asked;
  const words = `PostgreSQL ${row.version}, ${row.size}, answered in ${took.toFixed(1)} ms`;
  return { name: 'Database', state: took < 200 ? 'well' : 'warning', words };
}

async function connectionsLine(manager: EntityManager): Promise<Line> {
  const [row] = (await manager.query(
    `select count(*)::int as used, current_setting('max_connections')::int as most
     from pg_stat_activity where backend_type = 'client backend'`,
  )) as [{ used: number; most: number }];
  const state = row.used < row.most * 0.8 ? 'well' : 'warning';
  return { name: 'Connections', state, words: `${row.used} of at most ${row.most}` };
}

/** The promise of the audit trail and the records, looked up where it is kept. */
async function sealLine(manager: EntityManager): Promise<Line> {
  const rows = (await manager.query(
    `select c.relname as name, t.tgenabled = 'O' as works,
       has_table_privilege(c.oid, 'update') or has_table_privilege(c.oid, 'delete') as open
     from pg_trigger t join pg_class c on c.oid = t.tgrelid where t.tgname = 'sealed' order by 1`,
  )) as { name: string; works: boolean; open: boolean }[];
  const broken = rows.filter(({ works, open }) => !works || open).map(({ name }) => name);
  if (rows.length === 0 || broken.length > 0) {
    return { name: 'Sealed tables', state: 'ill', words: `not sealed: ${broken.join(', ') || 'none is'}` };
  }
  const names = rows.map(({ name }) => name).join(', ');
  return { name: 'Sealed tables', state: 'well', words: `lines are added, never altered: ${names}` };
}

async function mailLine(manager: EntityManager, config: Config): Promise<Line> {
  const { waiting, failed } = await countOutbox(manager);
  if (config.MAIL_URL === undefined) {
    const words = `no mail server (MAIL_URL); ${waiting === 1 ? '1 letter waits' : `${waiting} letters wait`} in the outbox below`;
    return { name: 'Mail', state: 'warning', words };
  }
  const words = `${waiting} waiting, ${failed} given up`;
  return { name: 'Mail', state: failed === 0 ? 'well' : 'warning', words };
}

function engineLine({ workers, waiting, running }: QueueView): Line {
  if (workers.length === 0) return { name: 'Engine', state: 'ill', words: 'no worker is there to compute' };
  const kinds = [...new Set(workers.map(({ isolation }) => asClause(isolation)))].join('; ');
  const words = `${workers.length} workers (${kinds}), ${running} cells running, ${waiting} waiting`;
  return { name: 'Engine', state: waiting < 100 ? 'well' : 'warning', words };
}

/** A sentence as it stands within another. */
const asClause = (sentence: string): string =>
  sentence.replace(/\.$/u, '').replace(/^./u, (first) => first.toLowerCase());

async function diskLine(): Promise<Line> {
  const { bavail, blocks, bsize } = await statfs(process.cwd()).catch(() => statfs(homedir()));
  const free = (bavail * bsize) / 1e9;
  const share = bavail / blocks;
  const words = `${free.toFixed(1)} GB free (${Math.round(share * 100)} %)`;
  return { name: 'Disk', state: free < 0.3 ? 'ill' : free < 2 ? 'warning' : 'well', words };
}

function memoryLine(): Line {
  const megabytes = Math.round(process.memoryUsage.rss() / 1e6);
  const minutes = Math.round(process.uptime() / 60);
  const up = minutes < 120 ? `${minutes} min` : `${(minutes / 60).toFixed(1)} hours`;
  const words = `${megabytes} MB held by this process, up for ${up}`;
  return { name: 'Process', state: megabytes < 1500 ? 'well' : 'warning', words };
}
