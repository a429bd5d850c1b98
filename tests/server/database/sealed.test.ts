import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { recordAudit } from '../../../packages/server/src/modules/groups/index.ts';
import { buildGroup, buildPerson } from '../../support/build.ts';
import { startTestServer, type TestServer } from '../../support/server.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
  const lead = await buildPerson(server);
  await buildGroup(server, lead);
});
afterAll(() => server.stop());

/** Every table with a seal, as the database knows it; a new one is tested without being named here. */
async function sealedTables(): Promise<string[]> {
  const rows = await server.sql<{ name: string }>(
    `select c.relname as name from pg_trigger t join pg_class c on c.oid = t.tgrelid where t.tgname = 'sealed'`,
  );
  return rows.map(({ name }) => name);
}

/** Any column will do that may be named in an UPDATE: the statement must not come so far. */
async function someColumn(table: string): Promise<string> {
  const rows = await server.sql<{ name: string }>(
    `select attname as name from pg_attribute where attrelid = $1::regclass and attnum > 0 and attidentity = '' limit 1`,
    [`"${table}"`],
  );
  return rows[0]?.name ?? '';
}

async function attempts(table: string): Promise<string[]> {
  const column = await someColumn(table);
  return [
    `update "${table}" set "${column}" = "${column}"`,
    `update "${table}" set "${column}" = "${column}" where false`,
    `delete from "${table}"`,
    `truncate "${table}" cascade`,
  ];
}

describe('sealed tables', () => {
  test('the audit trail is one of them', async () => {
    expect(await sealedTables()).toContain('audit');
  });

  test('refuse UPDATE, DELETE and TRUNCATE even to the owner', async () => {
    for (const table of await sealedTables()) {
      for (const sql of await attempts(table)) {
        await expect(server.sql(sql), sql).rejects.toThrow('added, never altered');
      }
    }
  });

  test('refuse them to the application before any trigger is asked', async () => {
    for (const table of await sealedTables()) {
      for (const sql of await attempts(table)) {
        await expect(server.services.database.query(sql), sql).rejects.toThrow('permission denied');
      }
    }
  });

  test('take new lines', async () => {
    const { manager } = server.services.database;
    const [group] = await server.sql<{ id: string }>('select id from work_group');
    await recordAudit(manager, {
      group: group?.id ?? '',
      by: null,
      verb: 'group.renamed',
      words: 'did something',
    });
    const [last] = await server.sql<{ words: string }>('select words from audit order by id desc limit 1');
    expect(last?.words).toBe('did something');
  });
});

describe('the application role', () => {
  test.each([
    ['cannot take a trigger off', 'alter table audit disable trigger sealed'],
    ['cannot make tables', 'create table mine (id int)'],
    ['cannot make schemas', 'create schema mine'],
    ['cannot read the list of migrations', 'select * from migration'],
    ['cannot become the owner', 'set role stillroom'],
    ['cannot make roles', 'create role intruder'],
  ])('%s', async (_words, sql) => {
    await expect(server.services.database.query(sql)).rejects.toThrow(/permission denied|must be owner/u);
  });
});
