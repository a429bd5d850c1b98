import pg from 'pg';
import { describeError, type Logger } from '../logger.ts';

/** A pool of connections beside that of the entities. `query` gives the rows. */
export interface Connections {
  readonly pool: pg.Pool;
  query(sql: string, parameters?: unknown[]): Promise<unknown[]>;
  end(): Promise<void>;
}

interface Options {
  /** How the connections call themselves, for whoever looks at the database. */
  readonly name: string;
  readonly most: number;
  /**
   * Whether a commit waits for the disk. What can be computed again need not: a power cut may lose the last moments of
   * it, never more.
   */
  readonly durable: boolean;
}

/** Opens connections for work that must never wait behind requests, or keep them waiting. */
export function openConnections(url: string, log: Logger, { name, most, durable }: Options): Connections {
  const pool = new pg.Pool({
    connectionString: url,
    application_name: name,
    max: most,
    ...(durable ? {} : { options: '-c synchronous_commit=off' }),
  });
  const lost = (error: Error) =>
    log.warn('A connection to the database was lost.', { name, ...describeError(error) });
  pool.on('error', lost);
  pool.on('connect', (client) => client.on('error', lost));
  return {
    pool,
    query: async (sql, parameters = []) => (await pool.query(sql, parameters)).rows,
    end: () => pool.end(),
  };
}
