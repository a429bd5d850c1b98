// npm run faults: the server is killed under typing authors again and again, the database and the line are taken away.
// `npm test` does the same in brief. How often the server is killed may be given: npm run faults -- --crashes=100
import { buildStale } from './lib/build.mjs';
import { needChromium, needPostgres } from './lib/debian.mjs';
import { needNode } from './lib/node-version.mjs';
import { needNpmPackages } from './lib/npm.mjs';
import { bin, runLoudly } from './lib/run.mjs';
import { Complaint, main, say } from './lib/words.mjs';

const usual = 25;
const files = ['tests/live/crash', 'tests/live/two-processes', 'tests/browser/lost-line'];

await main(async () => {
  const crashes = readCrashes(process.argv.slice(2));
  needNode();
  needNpmPackages();
  needPostgres();
  const chromium = needChromium();
  buildStale();
  say(`Killing the server ${crashes} times under typing authors …`);
  process.exitCode = await runLoudly(process.execPath, [bin('vitest/vitest.mjs'), 'run', ...files], {
    env: { ...process.env, CHROMIUM: chromium, CRASHES: String(crashes) },
  });
});

function readCrashes(words) {
  const [word = `--crashes=${usual}`, ...others] = words;
  const given = Number(/^--crashes=(\d+)$/u.exec(word)?.[1]);
  if (others.length === 0 && given >= 1 && given <= 10_000) return given;
  throw new Complaint(
    `${words.join(' ')} is not understood; the one option is --crashes=25, from 1 to 10000.`,
  );
}
