import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

/** The bundled engine, as npm test and npm start build it. */
export const engineFolder = fileURLToPath(new URL('../../packages/kernel/.build/worker', import.meta.url));
export const commandLine = fileURLToPath(
  new URL('../../packages/kernel/.build/cli/evaluate.mjs', import.meta.url),
);

if (!existsSync(engineFolder)) {
  throw new Error('The engine has not been built: run npm test, or node scripts/build-worker.mjs.');
}
