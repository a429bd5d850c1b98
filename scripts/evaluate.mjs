// npm run -s evaluate -- FILE [--cell NAME] [--out FILE]: computes a notebook file without a database. Results go to
// standard output or a file; everything else that is said goes to standard error.
import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { buildStale } from './lib/build.mjs';
import { needNode } from './lib/node-version.mjs';
import { needNpmPackages } from './lib/npm.mjs';
import { root } from './lib/place.mjs';
import { inWords, sayOnStandardError } from './lib/words.mjs';

const commandLine = join(root, 'packages/kernel/.build/cli/evaluate.mjs');
/** Exit status where nothing could be computed at all. */
const unusable = 2;

sayOnStandardError();
try {
  needNode();
  needNpmPackages();
  buildStale(['worker']);
  // npm changes into the project's folder; a file is named from where the person is.
  const cwd = process.env.INIT_CWD ?? process.cwd();
  const child = spawn(process.execPath, [commandLine, ...process.argv.slice(2)], { cwd, stdio: 'inherit' });
  for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => child.kill(signal));
  child.on('error', (error) => {
    process.stderr.write(`${inWords(error)}\n`);
    process.exitCode = unusable;
  });
  child.on('close', (status) => {
    process.exitCode = status ?? unusable;
  });
} catch (error) {
  process.stderr.write(`${inWords(error)}\n`);
  process.exitCode = unusable;
}
