import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { buildGroup, buildPerson, signIn } from '../support/build.ts';
import { createTestDatabase, type TestDatabase } from '../support/database.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

/** A backup is worth what restoring it brings back: so this restores one. */
const folder = mkdtempSync(join(tmpdir(), 'backup-'));
const file = join(folder, 'all.backup');
let server: TestServer;
let fresh: TestDatabase;
beforeAll(async () => {
  server = await startTestServer();
  fresh = await createTestDatabase();
});
afterAll(async () => {
  await server.stop();
  await fresh.drop();
  rmSync(folder, { recursive: true });
});

/** Runs `npm run backup` or `restore` against a database. */
function run(script: string, database: TestDatabase): string {
  return execFileSync(
    process.execPath,
    [fileURLToPath(new URL(`../../scripts/${script}.mjs`, import.meta.url)), file],
    {
      encoding: 'utf8',
      env: {
        ...process.env,
        DATA_FOLDER: folder,
        DATABASE_URL: database.url,
        DATABASE_OWNER_URL: database.ownerUrl,
        SESSION_SECRET: 'a secret for tests only, long enough to pass',
      },
    },
  );
}

test('what was backed up while people worked is there again after restoring, seals included', async () => {
  const lead = await buildPerson(server, { email: 'kept@example.org' });
  const group = await buildGroup(server, lead, 'Kept Kinetics');
  expect(run('backup', server.database)).toContain(`Backed up to ${file}`);
  expect(statSync(file).mode & 0o077).toBe(0);

  const said = run('restore', fresh);
  expect(said).toContain('Restored from');
  const restored = await startTestServer({}, fresh);
  try {
    const visitor = await signIn(restored, lead);
    const { body } = await visitor.get('/api/groups');
    expect(body).toMatchObject([{ id: group.id, name: 'Kept Kinetics' }]);
    expect((await visitor.get(`/api/groups/${group.id}/audit`)).status).toBe(200);
    await expect(restored.sql('delete from audit')).rejects.toThrow('added, never altered');
    await expect(restored.services.database.query('delete from audit')).rejects.toThrow('permission denied');
  } finally {
    await restored.stop();
    const aside = /database (\w+);/u.exec(said)?.[1];
    await server.sql(`drop database if exists "${aside}"`);
  }
}, 180_000);
