// npm test: everything that must hold, on a bare machine too. Arguments go to the test runner: npm test -- tests/api
import { join } from 'node:path';
import { buildAll } from './lib/build.mjs';
import { runChecks } from './lib/checks.mjs';
import { needChromium, needPostgres } from './lib/debian.mjs';
import { needSpace } from './lib/disk.mjs';
import { takeLock } from './lib/lock.mjs';
import { needNode } from './lib/node-version.mjs';
import { needNpmPackages } from './lib/npm.mjs';
import { dataPath } from './lib/place.mjs';
import { bin, runLoudly } from './lib/run.mjs';
import { Complaint, main, say, tell } from './lib/words.mjs';

await main(async () => {
  needNode();
  needSpace(dataPath(), 500);
  const lock = await takeLock(join(dataPath('test'), 'run.lock'));
  if (lock === null)
    throw new Complaint('Another npm test runs in this folder; wait for it, both build the same files.');
  needNpmPackages();
  needPostgres();
  const chromium = needChromium();
  const failed = await checkEverything();
  say('Running the tests …');
  const status = await runLoudly(
    process.execPath,
    [bin('vitest/vitest.mjs'), 'run', ...process.argv.slice(2)],
    {
      // The reporter counts these too, so that the closing line never says less than the exit status.
      env: { ...process.env, CHROMIUM: chromium, STILLROOM_FAILED_CHECKS: failed.join(',') },
    },
  );
  await lock.release();
  process.exitCode = status !== 0 ? status : Math.min(failed.length, 1);
});

/** Lint, types, build; tests run whatever comes of it. @returns names of what failed. */
async function checkEverything() {
  const complaints = buildAll();
  for (const complaint of complaints) tell(`\n${complaint}\n`);
  const failed = await runChecks();
  return complaints.length > 0 ? ['build', ...failed] : failed;
}
