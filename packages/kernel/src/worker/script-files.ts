import { readFile } from 'node:fs/promises';
import { loadScriptEngine, type MendableScriptEngine } from '../script/index.ts';

/** The files beside the bundled worker that scripts need: QuickJS, and the memory they begin with. */
export const scriptFiles = { wasm: 'quickjs.wasm', snapshot: 'script-memory.bin' } as const;

/** Loads the sandbox from the folder of the bundled worker. */
export async function loadScripts(folder: URL): Promise<MendableScriptEngine> {
  const [wasm, snapshot] = await Promise.all([
    readFile(new URL(scriptFiles.wasm, folder)),
    readFile(new URL(scriptFiles.snapshot, folder)),
  ]);
  return loadScriptEngine(new Uint8Array(wasm), snapshot);
}
