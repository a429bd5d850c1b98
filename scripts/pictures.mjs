// npm run pictures: takes pictures of every page of a running demonstration. Words pick stations by name; --at names
// the address, --out the folder, --widths and --themes what to take.
import { spawnSync } from 'node:child_process';
import { needChromium } from './lib/debian.mjs';
import { needNode } from './lib/node-version.mjs';
import { needNpmPackages } from './lib/npm.mjs';
import { root } from './lib/place.mjs';
import { bin } from './lib/run.mjs';
import { main } from './lib/words.mjs';

await main(() => {
  needNode();
  needNpmPackages();
  needChromium();
  const tsx = [bin('tsx/dist/cli.mjs'), '--conditions=development', '--tsconfig', 'tsconfig.base.json'];
  const take = [...tsx, 'tests/pictures/take.ts', ...process.argv.slice(2)];
  process.exitCode = spawnSync(process.execPath, take, { cwd: root, stdio: 'inherit' }).status ?? 1;
});
