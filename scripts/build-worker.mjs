import { spawnSync } from 'node:child_process';
import { copyFileSync, existsSync, mkdirSync, renameSync, rmSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { build } from 'vite';
import { root } from './lib/place.mjs';

/**
 * Bundles the engine's worker, with all that it reads, into one folder that can be copied elsewhere
 * (packages/kernel/.build/worker), and the command line beside it (packages/kernel/.build/cli).
 */
const kernel = join(root, 'packages/kernel');
const target = join(kernel, '.build');
const fresh = join(root, `.build/engine-new-${process.pid}`);
const old = join(root, `.build/engine-old-${process.pid}`);
const require = createRequire(join(kernel, 'package.json'));

/** Bundles one entry with everything it imports but Node's own modules. */
async function bundle(entry, folder) {
  await build({
    configFile: false,
    root: kernel,
    logLevel: 'warn',
    resolve: { conditions: ['development', 'module', 'node', 'import', 'default'] },
    ssr: { noExternal: true, target: 'node' },
    build: {
      ssr: true,
      outDir: join(fresh, folder),
      emptyOutDir: false,
      target: 'node20',
      minify: false,
      rollupOptions: {
        input: join(kernel, 'src', entry),
        output: { entryFileNames: '[name].mjs', chunkFileNames: '[name]-[hash].mjs' },
      },
    },
  });
}

/** The memory that scripts begin with: QuickJS after it has loaded the maths library. */
function makeScriptMemory(wasm) {
  const guest = (name) => join(kernel, 'src/script/guest', name);
  const sources = [
    guest('before-library.js'),
    require.resolve('mathjs/lib/browser/math.js'),
    guest('host.js'),
  ];
  const maker = join(fresh, 'make/make-script-memory.mjs');
  const output = join(fresh, 'worker/script-memory.bin');
  const { status } = spawnSync(process.execPath, [maker, wasm, output, ...sources], {
    stdio: 'inherit',
    env: { TZ: 'UTC', LANG: 'C.UTF-8' },
  });
  if (status !== 0) throw new Error('The memory that scripts begin with could not be made.');
}

/** Swaps the new build for the old one; another build may do the same at this moment. */
function putInPlace(attempts = 5) {
  try {
    if (existsSync(target)) renameSync(target, old);
    renameSync(fresh, target);
  } catch (error) {
    if (attempts <= 1) throw error;
    rmSync(old, { recursive: true, force: true });
    putInPlace(attempts - 1);
  }
}

try {
  mkdirSync(join(fresh, 'worker'), { recursive: true });
  await bundle('worker/worker.ts', 'worker');
  await bundle('worker/make-script-memory.ts', 'make');
  await bundle('cli/evaluate.ts', 'cli');
  const wasm = join(fresh, 'worker/quickjs.wasm');
  copyFileSync(require.resolve('@jitl/quickjs-wasmfile-release-sync/wasm'), wasm);
  makeScriptMemory(wasm);
  rmSync(join(fresh, 'make'), { recursive: true });
  putInPlace();
} finally {
  for (const folder of [fresh, old]) rmSync(folder, { recursive: true, force: true });
}
