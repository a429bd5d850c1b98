import { readdirSync, readFileSync } from 'node:fs';
import { join, relative, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

export const root = fileURLToPath(new URL('../../', import.meta.url));

/** A source file of the project with its repository path and the modules it names in imports and exports. */
export interface SourceFile {
  readonly path: string;
  readonly text: string;
  readonly imports: readonly string[];
}

const naming = /(?:\bfrom\s+|\bimport\s*\(\s*|\bimport\s+)['"]([^'"]+)['"]/g;

/** Every TypeScript, Vue and module script under a folder of the repository, leaving out what is built or installed. */
export function sourcesUnder(folder: string): SourceFile[] {
  return readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(ts|vue|mjs)$/.test(entry.name))
    .map((entry) => join(entry.parentPath, entry.name))
    .filter((path) => !/\/(node_modules|dist|\.build)\//.test(path))
    .map((path) => {
      const text = readFileSync(path, 'utf8');
      const imports = [...text.matchAll(naming)].map((match) => match[1] ?? '');
      return { path: relative(root, path), text, imports };
    });
}

/** The repository path a relative import leads to. */
export const target = (file: SourceFile, specifier: string): string =>
  relative(root, resolve(root, file.path, '..', specifier));
