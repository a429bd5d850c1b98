import { readFileSync } from 'node:fs';
import { runQuietly } from './run.mjs';
import { Complaint } from './words.mjs';

/**
 * The account that PostgreSQL runs under: our own, or `postgres` when started by root, which PostgreSQL refuses.
 * @returns {{ uid?: number, gid?: number }} as spawn takes it; empty for our own.
 */
export function databaseAccount() {
  if (process.getuid?.() !== 0) return {};
  return accountNamed('postgres');
}

/** User and group id of an account. */
export function accountNamed(name) {
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((candidate) => candidate.startsWith(`${name}:`));
  if (line === undefined) {
    throw new Complaint(
      `There is no account "${name}" to run PostgreSQL under; make one, or start as another user than root.`,
    );
  }
  const [, , uid, gid] = line.split(':');
  return { uid: Number(uid), gid: Number(gid) };
}

/** Whether an account can enter a folder: asked by trying, since mode bits of every parent count. */
export function canEnter(account, folder) {
  return runQuietly('test', ['-x', folder], { ...account, cwd: '/' }).ok;
}
