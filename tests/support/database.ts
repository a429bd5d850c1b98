import { createHash, randomBytes } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import { inject } from 'vitest';
import { migrate } from '../../packages/server/src/database/migrate.ts';

const migrations = fileURLToPath(new URL('../../packages/server/src/database', import.meta.url));
/** Any number, but always the same: one process makes the template. */
const lock = 7_070_002;

export interface TestDatabase {
  /** Address for the application role. */
  readonly url: string;
  readonly ownerUrl: string;
  drop(): Promise<void>;
}

/** Addresses of the maintenance database of a cluster, as owner and as application. */
export interface Cluster {
  readonly owner: string;
  readonly application: string;
}

/**
 * A fresh, migrated database: a copy of a template that is migrated once for each state of the migrations. One for
 * each test file, so that files never see each other. Outside the test runner the cluster is given.
 */
export async function createTestDatabase(cluster: Cluster = inject('cluster')): Promise<TestDatabase> {
  const admin = new pg.Client({ connectionString: cluster.owner });
  await admin.connect();
  const name = `test_${randomBytes(6).toString('hex')}`;
  try {
    await admin.query('select pg_advisory_lock($1)', [lock]);
    const template = await needTemplate(admin, cluster);
    await admin.query(`create database ${name} template ${template}`);
  } finally {
    await admin.end();
  }
  return {
    url: at(cluster.application, name),
    ownerUrl: at(cluster.owner, name),
    drop: () => dropDatabase(cluster.owner, name),
  };
}

async function needTemplate(admin: pg.Client, cluster: Cluster): Promise<string> {
  const template = `template_${hashOfMigrations()}`;
  const known = await admin.query('select 1 from pg_database where datname = $1', [template]);
  if (known.rowCount !== 0) return template;
  // Migrated under another name first: a template that exists is whole.
  const draft = `${template}_draft`;
  await admin.query(`drop database if exists ${draft} with (force)`);
  await admin.query(`create database ${draft}`);
  await migrate(at(cluster.owner, draft), at(cluster.application, draft));
  await admin.query(`alter database ${draft} rename to ${template}`);
  return template;
}

async function dropDatabase(owner: string, name: string): Promise<void> {
  const admin = new pg.Client({ connectionString: owner });
  await admin.connect();
  await admin.query(`drop database if exists ${name} with (force)`).finally(() => admin.end());
}

function hashOfMigrations(): string {
  const hash = createHash('sha256');
  for (const entry of readdirSync(migrations, { recursive: true, withFileTypes: true })) {
    if (entry.isFile()) hash.update(entry.name).update(readFileSync(join(entry.parentPath, entry.name)));
  }
  return hash.digest('hex').slice(0, 16);
}

function at(url: string, database: string): string {
  const address = new URL(url);
  address.pathname = database;
  return address.href;
}
