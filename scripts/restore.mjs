// npm run restore -- FILE: puts a backup in the place of what the installation holds. Stillroom must not be running.
import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { buildStale } from './lib/build.mjs';
import { needPostgres } from './lib/debian.mjs';
import { migrateDatabase, openDatabase } from './lib/installation.mjs';
import { takeLock } from './lib/lock.mjs';
import { needNpmPackages } from './lib/npm.mjs';
import { dataPath } from './lib/place.mjs';
import { restoreDatabase } from './lib/restore.mjs';
import { Complaint, main, say, tell } from './lib/words.mjs';

await main(async () => {
  const [given] = process.argv.slice(2);
  if (given === undefined) throw new Complaint('Say which file: npm run restore -- FILE');
  const file = resolve(given);
  if (!existsSync(file)) throw new Complaint(`There is no file ${file}.`);
  const lock = await takeLock(join(dataPath(), 'running.lock'));
  if (lock === null) throw new Complaint('Stillroom is running; stop it first, then restore.');
  needNpmPackages();
  buildStale(['server']);
  const database = await openDatabase();
  try {
    const env = { ...process.env, ...database.env };
    say('Restoring …');
    const aside = restoreDatabase(needPostgres(), env.DATABASE_OWNER_URL, file);
    migrateDatabase(database.env);
    tell(
      `Restored from ${file}. What was there before is kept as database ${aside}; drop it when all is well.`,
    );
  } finally {
    database.stop();
    await lock.release();
  }
});
