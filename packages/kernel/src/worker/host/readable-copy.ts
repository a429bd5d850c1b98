import { createHash } from 'node:crypto';
import {
  chmodSync,
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
} from 'node:fs';
import { join } from 'node:path';

/** A name for the bytes of a folder's files. */
function nameOf(folder: string): string {
  const hash = createHash('sha256');
  for (const file of readdirSync(folder).sort()) {
    hash
      .update(file)
      .update('\0')
      .update(readFileSync(join(folder, file)))
      .update('\0');
  }
  return `stillroom-engine-${hash.digest('hex').slice(0, 16)}`;
}

/** Whether a copy is there and is ours: in a folder open to all, another account could have laid one out. */
const ours = (copy: string): boolean => existsSync(copy) && statSync(copy).uid === process.getuid?.();

/**
 * Copies the engine to where every account can read it; a copy of the same bytes is used again.
 *
 * @returns the folder of the copy
 * @throws Error where it cannot be written
 */
export function readableCopy(folder: string, stateFolder: string): string {
  const copy = join(stateFolder, nameOf(folder));
  if (ours(copy)) return copy;
  mkdirSync(stateFolder, { recursive: true });
  const half = mkdtempSync(`${copy}-`);
  cpSync(folder, half, { recursive: true });
  chmodSync(half, 0o755);
  try {
    renameSync(half, copy);
  } catch (error) {
    rmSync(half, { recursive: true, force: true });
    if (!ours(copy)) throw error;
  }
  return copy;
}
