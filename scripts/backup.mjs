// npm run backup [-- FILE]: writes everything an installation keeps into one file, while it runs.
import { chmodSync, existsSync, mkdirSync, renameSync, rmSync, statSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { needPostgres } from './lib/debian.mjs';
import { joinDatabase } from './lib/installation.mjs';
import { dataPath } from './lib/place.mjs';
import { runQuietly, tail } from './lib/run.mjs';
import { Complaint, main, tell } from './lib/words.mjs';

await main(() => {
  const url = process.env.DATABASE_OWNER_URL || joinDatabase().DATABASE_OWNER_URL;
  if (!url) throw new Complaint('A backup needs DATABASE_OWNER_URL beside DATABASE_URL.');
  const file = resolve(process.argv[2] ?? join(dataPath('backups'), `stillroom-${stamp()}.backup`));
  if (existsSync(file)) throw new Complaint(`${file} exists already; choose another name.`);
  mkdirSync(dirname(file), { recursive: true });
  const draft = `${file}.part`;
  // Rights are given anew when restoring, so that the names of the roles may differ there.
  // What was being computed stays out: its results are kept by digest, and what is missing is queued again.
  const args = [
    '--format=custom',
    '--no-owner',
    '--no-privileges',
    '--exclude-schema=graphile_worker',
    '--exclude-table-data=cell_run',
    `--file=${draft}`,
    url,
  ];
  const { ok, output } = runQuietly(join(needPostgres(), 'pg_dump'), args);
  if (!ok) {
    rmSync(draft, { force: true });
    throw new Complaint(`The backup failed:\n${tail(output)}`);
  }
  chmodSync(draft, 0o600);
  renameSync(draft, file);
  tell(
    `Backed up to ${file} (${(statSync(file).size / 1e6).toFixed(1)} MB). Bring it back with: npm run restore -- ${file}`,
  );
});

const stamp = () => new Date().toISOString().slice(0, 19).replaceAll(':', '-');
