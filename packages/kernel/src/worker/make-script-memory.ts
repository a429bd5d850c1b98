import { readFileSync, writeFileSync } from 'node:fs';
import { basename } from 'node:path';
import { makeSnapshot } from '../script/index.ts';

/** node make-script-memory.mjs WASM OUTPUT SOURCE…: run by the build, once for each build. */
const [wasm = '', output = '', ...sources] = process.argv.slice(2);
const memory = await makeSnapshot(
  new Uint8Array(readFileSync(wasm)),
  sources.map((file) => ({ name: basename(file), text: readFileSync(file, 'utf8') })),
);
writeFileSync(output, memory);
