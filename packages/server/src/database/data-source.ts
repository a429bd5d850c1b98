import { DataSource } from 'typeorm';
import { migrations } from './migrations/index.ts';

/** An entity class. */
export type Entity = new () => object;

interface Options {
  readonly url: string;
  readonly entities?: readonly Entity[];
  /** Connections held at most. */
  readonly pool?: number;
}

/** A source of connections that never changes the schema by itself; call `initialize()` before use. */
export function createDataSource({ url, entities = [], pool = 16 }: Options): DataSource {
  return new DataSource({
    type: 'postgres',
    url,
    entities: [...entities],
    migrations: [...migrations],
    migrationsTableName: 'migration',
    synchronize: false,
    logging: false,
    applicationName: 'stillroom',
    poolSize: pool,
    connectTimeoutMS: 5_000,
  });
}
