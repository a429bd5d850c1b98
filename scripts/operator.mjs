// npm run operator -- ADDRESS [NAME]: makes somebody operator of the running installation; its first one, above all.
import { buildStale } from './lib/build.mjs';
import { joinDatabase, runningNote, serverEnvironment } from './lib/installation.mjs';
import { needNpmPackages } from './lib/npm.mjs';
import { runLoudly } from './lib/run.mjs';
import { Complaint, main } from './lib/words.mjs';

await main(async () => {
  const [address, ...name] = process.argv.slice(2);
  if (address === undefined) throw new Complaint('Say who: npm run operator -- name@place.org "Their Name"');
  const note = runningNote.read();
  const env = { ...(note === null ? {} : { PORT: String(note.port) }), ...serverEnvironment(joinDatabase()) };
  needNpmPackages();
  buildStale(['server']);
  const args = [
    'packages/server/dist/make-operator.js',
    address,
    ...(name.length > 0 ? [name.join(' ')] : []),
  ];
  process.exitCode = await runLoudly(process.execPath, args, { env });
});
