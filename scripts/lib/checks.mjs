import { spawn } from 'node:child_process';
import { root } from './place.mjs';
import { bin } from './run.mjs';
import { say, tell } from './words.mjs';

/** What is checked beside the tests. All of these only read. */
const checks = [
  {
    name: 'lint',
    program: 'eslint/bin/eslint.js',
    args: ['.', '--cache', '--cache-location', '.build/eslint'],
  },
  { name: 'formatting', program: 'prettier/bin/prettier.cjs', args: ['--check', '--log-level', 'warn', '.'] },
  {
    name: 'types of the pages',
    program: 'vue-tsc/bin/vue-tsc.js',
    args: ['--noEmit', '-p', 'packages/client'],
  },
  { name: 'types of the tests', program: 'typescript/bin/tsc', args: ['--noEmit', '-p', 'tests'] },
];

/** Runs the checks, two at a time, and prints the words of each that fails. @returns names of those. */
export async function runChecks() {
  const failed = [];
  const waiting = [...checks];
  const next = async () => {
    for (let check = waiting.shift(); check !== undefined; check = waiting.shift()) {
      say(`Checking ${check.name} …`);
      const { status, output } = await run(check);
      if (status === 0) continue;
      failed.push(check.name);
      tell(`\nChecking ${check.name} found something:\n${output.trim()}\n`);
    }
  };
  await Promise.all([next(), next()]);
  return failed;
}

function run({ program, args }) {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [bin(program), ...args], {
      cwd: root,
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    let output = '';
    for (const stream of [child.stdout, child.stderr]) stream.on('data', (chunk) => (output += chunk));
    child.on('error', reject);
    child.on('close', (status) => resolve({ status, output }));
  });
}
