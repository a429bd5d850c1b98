import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { root } from './place.mjs';
import { runQuietly, tail } from './run.mjs';
import { Complaint, say } from './words.mjs';

/** Installs npm packages where any is missing or of another version than the lock file says. */
export function needNpmPackages() {
  const missing = missingPackages();
  if (missing === 0) return;
  say(`Installing ${missing} npm packages …`);
  const { ok, output } = runQuietly('npm', ['ci', '--include=dev', '--no-audit', '--no-fund']);
  if (!ok) {
    throw new Complaint(
      `The npm packages could not be installed; is there a way to the registry?\n${tail(output)}`,
    );
  }
}

/** How many packages of the lock file are not there as it says. */
export function missingPackages() {
  const wanted = readPackages(join(root, 'package-lock.json'));
  const installed = readPackages(join(root, 'node_modules/.package-lock.json'));
  const names = Object.keys(wanted).filter((name) => name !== '');
  return names.filter((name) => {
    const { link, optional, version } = wanted[name];
    if (link) return !existsSync(join(root, name));
    if (!name.startsWith('node_modules/') || optional) return false;
    return installed[name]?.version !== version;
  }).length;
}

function readPackages(file) {
  return existsSync(file) ? (JSON.parse(readFileSync(file, 'utf8')).packages ?? {}) : {};
}
