import pg from 'pg';
import { afterAll, beforeAll, expect, inject, test } from 'vitest';
import { createDataSource } from '../../../packages/server/src/database/data-source.ts';
import { migrate } from '../../../packages/server/src/database/migrate.ts';

const name = `migrate_${process.pid}`;
const cluster = inject('cluster');
const at = (url: string) => Object.assign(new URL(url), { pathname: name }).href;

let admin: pg.Client;
beforeAll(async () => {
  admin = new pg.Client({ connectionString: cluster.owner });
  await admin.connect();
  await admin.query(`create database ${name}`);
});
afterAll(async () => {
  await admin.query(`drop database ${name} with (force)`);
  await admin.end();
});

test('three processes that migrate an empty database at once do not collide; one does the work', async () => {
  const runs = await Promise.all([1, 2, 3].map(() => migrate(at(cluster.owner), at(cluster.application))));
  const counts = runs.map(({ length }) => length).sort((a, b) => a - b);
  expect(counts.slice(0, 2)).toEqual([0, 0]);
  expect(counts[2]).toBeGreaterThan(0);
});

test('every migration can be taken back and run again', async () => {
  const database = await createDataSource({ url: at(cluster.owner), pool: 2 }).initialize();
  try {
    const count = (await database.query('select count(*)::int as count from migration')) as [
      { count: number },
    ];
    for (let undone = 0; undone < count[0].count; undone += 1) await database.undoLastMigration();
    const tables = (await database.query(
      `select tablename from pg_tables where schemaname = 'public' and tablename <> 'migration'`,
    )) as unknown[];
    expect(tables).toEqual([]);
    expect(await database.runMigrations({ transaction: 'all' })).toHaveLength(count[0].count);
  } finally {
    await database.destroy();
  }
});
