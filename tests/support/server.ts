import pg from 'pg';
import { readConfig } from '../../packages/server/src/config/index.ts';
import { createLogger, type Logger } from '../../packages/server/src/logger.ts';
import { startServer } from '../../packages/server/src/server.ts';
import type { Services } from '../../packages/server/src/services.ts';
import { createTestDatabase, type TestDatabase } from './database.ts';

export interface TestServer {
  /** "http://127.0.0.1:12345" */
  readonly url: string;
  readonly services: Services;
  readonly database: TestDatabase;
  /** What the server logged, line by line. */
  readonly log: readonly string[];
  /** Runs a statement as owner of the database. */
  sql<Row extends pg.QueryResultRow>(text: string, values?: readonly unknown[]): Promise<Row[]>;
  stop(): Promise<void>;
}

/**
 * A whole server on a free port with a database of its own, or with a given one that the caller drops; limits are wide
 * unless a test sets them.
 */
export async function startTestServer(
  settings: Readonly<Record<string, string>> = {},
  given?: TestDatabase,
): Promise<TestServer> {
  const database = given ?? (await createTestDatabase());
  const log: string[] = [];
  const logger: Logger = createLogger('info', (line) => void log.push(line.trimEnd()));
  const config = readConfig({
    DATABASE_URL: database.url,
    SESSION_SECRET: 'a secret for tests only, long enough to pass',
    PORT: '0',
    RATE_FACTOR: '1000',
    ...settings,
  });
  const running = await startServer(config, logger);
  const owner = new pg.Pool({ connectionString: database.ownerUrl, max: 2 });
  // Dropping the database ends connections that are still being closed; that is no failure of a test.
  owner.on('error', () => undefined);
  return {
    url: `http://127.0.0.1:${running.port}`,
    services: running.services,
    database,
    log,
    sql: async (text, values = []) => (await owner.query(text, [...values])).rows,
    async stop() {
      await running.stop();
      await owner.end();
      if (given === undefined) await database.drop();
    },
  };
}
