// npm run bench: measures and prints. Arguments pick files by name: npm run bench -- structure
import { spawn } from 'node:child_process';
import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { buildStale } from './lib/build.mjs';
import { needChromium } from './lib/debian.mjs';
import { needNode } from './lib/node-version.mjs';
import { needNpmPackages } from './lib/npm.mjs';
import { root } from './lib/place.mjs';
import { bin } from './lib/run.mjs';
import { useTestCluster } from './lib/test-cluster.mjs';
import { Complaint, main, say } from './lib/words.mjs';

const folder = join(root, 'tests/bench');
const ending = '.bench.ts';

await main(async () => {
  needNode();
  needNpmPackages();
  const files = pickFiles(process.argv.slice(2));
  buildStale();
  const cluster = await useTestCluster();
  const env = {
    ...process.env,
    CHROMIUM: needChromium(),
    BENCH_OWNER_URL: cluster.owner,
    BENCH_APPLICATION_URL: cluster.application,
  };
  try {
    for (const file of files) {
      say(`Measuring ${file.slice(0, -ending.length)} …`);
      if ((await run(join(folder, file), env)) !== 0) process.exitCode = 1;
    }
  } finally {
    await cluster.release();
  }
});

/** Benchmarks whose name holds one of the words; all of them where none is given. */
function pickFiles(args) {
  const words = args.filter((word) => !word.startsWith('-'));
  const all = existsSync(folder) ? readdirSync(folder).filter((name) => name.endsWith(ending)) : [];
  const picked = all.filter((name) => words.length === 0 || words.some((word) => name.includes(word)));
  if (picked.length > 0) return picked.sort();
  throw new Complaint(
    `No benchmark has ${words.join(' or ') || 'any name'} in its name; there are: ${all.join(', ') || 'none'}.`,
  );
}

/** Options (`--peers`) are handed on to each file. */
function run(file, env) {
  const options = process.argv.slice(2).filter((word) => word.startsWith('-'));
  const tsx = [
    bin('tsx/dist/cli.mjs'),
    '--conditions=development',
    '--tsconfig',
    'tsconfig.base.json',
    file,
    ...options,
  ];
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, tsx, { cwd: root, env, stdio: 'inherit' });
    child.on('error', reject);
    child.on('close', (status) => resolve(status ?? 1));
  });
}
