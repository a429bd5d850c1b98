import { runMigrations } from 'graphile-worker';
import { createDataSource } from './data-source.ts';
import { grantToApplication, whileMayCreateSchema } from './grants.ts';

/** Any number, but always the same: two processes that migrate at once would collide in the catalogue. */
const lock = 7_070_001;

/**
 * Brings the schema up to date as its owner, gives the application role its rights and prepares the job queue.
 * @returns names of the migrations that ran.
 */
export async function migrate(ownerUrl: string, applicationUrl: string): Promise<string[]> {
  const database = await createDataSource({ url: ownerUrl, pool: 4 }).initialize();
  const runner = database.createQueryRunner();
  try {
    await runner.query('select pg_advisory_lock($1)', [lock]);
    const ran = await database.runMigrations({ transaction: 'all' });
    const role = roleOf(applicationUrl);
    await grantToApplication(runner, role);
    await whileMayCreateSchema(runner, role, () =>
      runMigrations({ connectionString: applicationUrl, maxPoolSize: 1 }),
    );
    return ran.map(({ name }) => name);
  } finally {
    await runner.query('select pg_advisory_unlock($1)', [lock]).catch(() => undefined);
    await runner.release();
    await database.destroy();
  }
}

/** The role in the address of a database. */
export const roleOf = (url: string): string => decodeURIComponent(new URL(url).username);
