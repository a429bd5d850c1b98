import { ConfigError, readConfig } from './config/index.ts';
import { migrate } from './database/migrate.ts';

/** Brings the database up to date before a start; run by the start script, and alone by whoever runs many servers. */
try {
  const { DATABASE_OWNER_URL: owner, DATABASE_URL: application } = readConfig(process.env);
  if (owner === undefined)
    throw new ConfigError('Migrations need DATABASE_OWNER_URL, the address of the owner.');
  const ran = await migrate(owner, application);
  process.stdout.write(
    ran.length === 0 ? 'Database: up to date.\n' : `Database: ${ran.length} migrations ran.\n`,
  );
} catch (error) {
  const words =
    error instanceof ConfigError ? error.message : error instanceof Error ? error.stack : String(error);
  process.stderr.write(`${words}\n`);
  process.exit(1);
}
