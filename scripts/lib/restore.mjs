import { join } from 'node:path';
import { runQuietly, tail } from './run.mjs';
import { Complaint } from './words.mjs';

/**
 * Restores a backup into the database of an address. It is read into a new one first and takes the place only when it
 * was read whole; what was there is kept under another name. @returns that name
 */
export function restoreDatabase(programs, ownerUrl, file) {
  if (!ownerUrl) throw new Complaint('Restoring needs DATABASE_OWNER_URL, the address of the owner.');
  const address = new URL(ownerUrl);
  const name = decodeURIComponent(address.pathname.slice(1));
  const draft = `${name}_restored`;
  const aside = `${name}_before_${new Date().toISOString().slice(0, 19).replace(/\D/gu, '')}`;
  const sql = (statement) =>
    run(join(programs, 'psql'), [
      '-X',
      '-q',
      '-v',
      'ON_ERROR_STOP=1',
      '-d',
      maintenance(address),
      '-c',
      statement,
    ]);
  sql(`drop database if exists "${draft}" with (force)`);
  sql(`create database "${draft}"`);
  const into = Object.assign(new URL(ownerUrl), { pathname: draft }).href;
  run(join(programs, 'pg_restore'), ['--no-owner', '--no-privileges', '--exit-on-error', '-d', into, file]);
  sql(`alter database "${name}" rename to "${aside}"`);
  sql(`alter database "${draft}" rename to "${name}"`);
  return aside;
}

const maintenance = (address) => Object.assign(new URL(address.href), { pathname: 'postgres' }).href;

function run(program, args) {
  const { ok, output } = runQuietly(program, args);
  if (!ok)
    throw new Complaint(`The backup could not be restored; what was there is untouched.\n${tail(output)}`);
}
