import { buildStale } from './build.mjs';
import { joinDatabase, serverEnvironment } from './installation.mjs';
import { needNode } from './node-version.mjs';
import { needNpmPackages } from './npm.mjs';
import { startServerProcess } from './server-process.mjs';
import { stopSignal } from './stop-signals.mjs';
import { Complaint, say } from './words.mjs';

/** Runs one more process of a running installation until a signal. */
export async function runBeside(settings, verb) {
  needNode();
  const env = { ...serverEnvironment(joinDatabase()), ...settings };
  needNpmPackages();
  buildStale(['server', 'worker', ...(settings.PROCESS === 'server' ? ['client'] : [])]);
  const signal = stopSignal();
  const server = await startServerProcess(env);
  say(
    server.port === null
      ? `${verb}; Ctrl-C stops it.`
      : `${verb} at http://localhost:${server.port}; Ctrl-C stops it.`,
  );
  const ending = await Promise.race([signal, server.ended]);
  await server.stop();
  if (typeof ending === 'number')
    throw new Complaint('The process ended by itself; its last words are above.');
}
