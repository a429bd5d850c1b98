import releaseVariant from '@jitl/quickjs-wasmfile-release-sync';
import {
  type EmscriptenModuleLoaderOptions,
  newQuickJSWASMModuleFromVariant,
  newVariant,
  type QuickJSContext,
  type QuickJSHandle,
  type QuickJSSyncVariant,
  type QuickJSWASMModule,
} from 'quickjs-emscripten-core';

/** The package's types speak of its CommonJS form, whose default export is one step further in. */
const variant = releaseVariant as unknown as QuickJSSyncVariant;

/**
 * The name of the running program is copied into the guest's memory: it has to be the same wherever a snapshot is made
 * or used, or everything after it stands elsewhere.
 */
const sameEnvironment: EmscriptenModuleLoaderOptions & { readonly thisProgram: string } = {
  thisProgram: './script',
};

/** Bytes the guest's heap may take, library included; stack of the guest. */
const memoryLimit = 192 * 1024 * 1024;
const stackSize = 512 * 1024;

/**
 * One QuickJS in one WebAssembly memory. Two instances that did the same things since their making have the same layout,
 * so that a copy of the memory of one can be put into another.
 */
export class QuickJsInstance {
  readonly context: QuickJSContext;
  private readonly module: QuickJSWASMModule;
  private interrupt: () => boolean = () => false;

  private constructor(module: QuickJSWASMModule) {
    this.module = module;
    const runtime = module.newRuntime();
    runtime.setMemoryLimit(memoryLimit);
    runtime.setMaxStackSize(stackSize);
    runtime.setInterruptHandler(() => this.interrupt());
    this.context = runtime.newContext();
  }

  /** @param wasm bytes of QuickJS */
  static async make(wasm: Uint8Array<ArrayBuffer>): Promise<QuickJsInstance> {
    const options = { wasmBinary: wasm.buffer, emscriptenModule: sameEnvironment };
    const module = await newQuickJSWASMModuleFromVariant(newVariant(variant, options));
    return new QuickJsInstance(module);
  }

  /** Bytes of its memory, which only grows. */
  get size(): number {
    return this.module.getWasmMemory().buffer.byteLength;
  }

  /** Does something in the guest during which `interrupt` is asked now and then; true ends it. */
  withInterrupt<T>(interrupt: () => boolean, act: () => T): T {
    this.interrupt = interrupt;
    try {
      return act();
    } finally {
      this.interrupt = () => false;
    }
  }

  /** Evaluates source that must not fail. The caller disposes of the handle. */
  evaluate(source: string, name: string): QuickJSHandle {
    return this.context.unwrapResult(this.context.evalCode(source, name));
  }

  /** A copy of the memory without the zeros at its end. */
  snapshot(): Uint8Array {
    const memory = new Uint8Array(this.module.getWasmMemory().buffer);
    let end = memory.length;
    while (end > 0 && memory[end - 1] === 0) end--;
    return memory.slice(0, end);
  }

  /** Puts a snapshot in place of the memory, which is grown through the guest where it is too small. */
  restore(snapshot: Uint8Array): void {
    const memory = this.module.getWasmMemory();
    if (memory.buffer.byteLength < snapshot.length) {
      this.evaluate(`new ArrayBuffer(${snapshot.length}).byteLength`, 'grow').dispose();
    }
    const bytes = new Uint8Array(memory.buffer);
    if (bytes.length < snapshot.length) throw new Error('The memory of the sandbox could not be grown.');
    bytes.set(snapshot);
    bytes.fill(0, snapshot.length);
  }
}
