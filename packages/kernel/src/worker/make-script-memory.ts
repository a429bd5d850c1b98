import { readFileSync, writeFileSync } from 'node:fs';
import { basename } from 'node:path';
import { loadScriptEngine, makeSnapshot } from '../script/index.ts';

/** node make-script-memory.mjs WASM OUTPUT SOURCE…: run by the build, once for each build. */
const [wasm = '', output = '', ...sources] = process.argv.slice(2);
const quickJs = new Uint8Array(readFileSync(wasm));
const memory = await makeSnapshot(
  quickJs,
  sources.map((file) => ({ name: basename(file), text: readFileSync(file, 'utf8') })),
);

// A memory that does not run is better noticed here than in somebody's notebook.
const engine = await loadScriptEngine(quickJs, memory);
const tried = engine.run('return math.add(1, 1)', {}, '0'.repeat(64), () => false);
if (tried.ended !== 'returned' || tried.value !== 2) {
  throw new Error(`The memory for scripts does not run: ${JSON.stringify(tried)}`);
}
writeFileSync(output, memory);
