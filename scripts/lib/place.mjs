import { createHash } from 'node:crypto';
import { mkdirSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The project's own folder. */
export const root = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

/** Everything that a running installation keeps, unless DATA_FOLDER says where. */
export const dataFolder = process.env.DATA_FOLDER || join(root, 'data');

/** A folder under the data folder, made when missing. */
export function dataPath(...parts) {
  const path = join(dataFolder, ...parts);
  mkdirSync(path, { recursive: true });
  return path;
}

/** The system's own folder for what a program keeps: for what stands in `home` when others may not enter there. */
export function stateFolder(home) {
  return join('/var/lib/stillroom', createHash('sha256').update(home).digest('hex').slice(0, 12));
}
