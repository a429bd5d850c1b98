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
