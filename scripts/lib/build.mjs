import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { precompress } from './precompress.mjs';
import { root } from './place.mjs';
import { bin, runQuietly, tail } from './run.mjs';
import { Complaint, say } from './words.mjs';

/**
 * What is built, from what, by what. Stale is decided by a hash of the sources: running the builders to find out
 * would take longer than a whole start may.
 */
const parts = [
  {
    name: 'server',
    words: 'the server',
    sources: ['packages/shared', 'packages/kernel', 'packages/server', 'tsconfig.json', 'tsconfig.base.json'],
    product: 'packages/server/dist/main.js',
    build: () =>
      runQuietly(process.execPath, [bin('typescript/bin/tsc'), '-b', 'packages/server', ...forced()]),
  },
  {
    name: 'worker',
    words: "the engine's worker",
    sources: ['packages/shared', 'packages/kernel', 'scripts/build-worker.mjs'],
    needs: 'scripts/build-worker.mjs',
    build: () => runQuietly(process.execPath, ['scripts/build-worker.mjs']),
  },
  {
    name: 'client',
    words: 'the pages',
    sources: [
      'packages/shared',
      'packages/kernel',
      'packages/client',
      'tsconfig.base.json',
      'scripts/lib/precompress.mjs',
    ],
    product: 'packages/client/dist/index.html',
    build() {
      const result = runQuietly(process.execPath, [
        bin('vite/bin/vite.js'),
        'build',
        'packages/client',
        '--logLevel',
        'warn',
      ]);
      if (result.ok) precompress(join(root, 'packages/client/dist'));
      return result;
    },
  },
];

const stampFolder = join(root, '.build');

/** Builds whatever is stale. @throws Complaint with the builder's own words where one fails. */
export function buildStale(names = parts.map(({ name }) => name)) {
  for (const part of parts.filter(({ name }) => names.includes(name))) {
    const complaint = buildPart(part);
    if (complaint !== null) throw new Complaint(complaint);
  }
}

/** As `buildStale`, but goes on after a failure. @returns one complaint for each part that failed. */
export function buildAll() {
  return parts.flatMap((part) => buildPart(part) ?? []);
}

function buildPart(part) {
  if (part.needs !== undefined && !existsSync(join(root, part.needs))) return null;
  const hash = hashOf(part.sources);
  const stamp = join(stampFolder, `${part.name}.hash`);
  const product = part.product === undefined || existsSync(join(root, part.product));
  if (product && existsSync(stamp) && readFileSync(stamp, 'utf8') === hash) return null;
  say(`Building ${part.words} …`);
  rmSync(stamp, { force: true });
  const { ok, output } = part.build();
  if (!ok) return `Building ${part.words} failed:\n${tail(output, 40)}`;
  mkdirSync(stampFolder, { recursive: true });
  writeFileSync(stamp, hash);
  return null;
}

/** A build of which files are missing is not noticed by the compiler, which trusts its own notes: then all anew. */
function forced() {
  return existsSync(join(root, 'packages/server/dist/main.js')) ? [] : ['--force'];
}

const skipped = new Set(['node_modules', 'dist', '.build']);

function hashOf(sources) {
  const hash = createHash('sha256');
  for (const file of sources.flatMap((source) => filesOf(source)).sort()) {
    hash
      .update(file)
      .update('\0')
      .update(readFileSync(join(root, file)))
      .update('\0');
  }
  hash.update(readFileSync(join(root, 'package-lock.json'))).update(process.version);
  return hash.digest('hex');
}

function filesOf(path) {
  const whole = join(root, path);
  if (!existsSync(whole)) return [];
  if (!statSync(whole).isDirectory()) return [path];
  const entries = readdirSync(whole, { withFileTypes: true });
  return entries.flatMap((entry) => {
    if (skipped.has(entry.name) || entry.name.endsWith('.tsbuildinfo')) return [];
    const inner = `${path}/${entry.name}`;
    return entry.isDirectory() ? filesOf(inner) : [inner];
  });
}
