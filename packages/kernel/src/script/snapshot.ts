import { QuickJsInstance } from './instance.ts';

/** Source that is run in the guest, in order, before the memory is copied. */
export interface GuestSource {
  readonly name: string;
  readonly text: string;
}

/**
 * Makes the memory from which every script starts: a guest in which `sources` have run.
 *
 * @param wasm bytes of QuickJS, the same that will run the scripts
 */
export async function makeSnapshot(
  wasm: Uint8Array<ArrayBuffer>,
  sources: readonly GuestSource[],
): Promise<Uint8Array> {
  const instance = await QuickJsInstance.make(wasm);
  for (const { name, text } of sources) instance.evaluate(text, name).dispose();
  return instance.snapshot();
}
