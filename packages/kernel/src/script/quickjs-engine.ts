import type { QuickJSHandle } from 'quickjs-emscripten-core';
import { QuickJsInstance } from './instance.ts';
import type { ScriptEngine, ScriptRun } from './script-engine.ts';

/** How often the guest may poll the interrupt while what it printed is fetched after its end. */
const pollsAfterEnd = 2000;

/** Bytes of memory above which clearing it takes longer than making another. */
const largestKept = 48 * 1024 * 1024;

interface Envelope {
  readonly value?: unknown;
  readonly notes?: unknown;
  readonly thrown?: {
    readonly name?: unknown;
    readonly message?: unknown;
    readonly line?: unknown;
    readonly column?: unknown;
  };
}

const wholeNumber = (value: unknown): value is number => Number.isSafeInteger(value) && Number(value) > 0;
const textsOf = (value: unknown): string[] =>
  Array.isArray(value) ? value.filter((entry): entry is string => typeof entry === 'string') : [];

/** What a guest's own words come to: nothing in them is trusted to have its form. */
function readEnvelope(text: string, printed: readonly string[]): ScriptRun {
  const envelope = JSON.parse(text) as Envelope;
  const { thrown } = envelope;
  if (thrown === undefined) {
    return { ended: 'returned', printed, value: envelope.value ?? null, notes: textsOf(envelope.notes) };
  }
  if (thrown.message === 'out of memory') return { ended: 'memory', printed };
  return {
    ended: 'threw',
    printed,
    message:
      typeof thrown.message === 'string' ? thrown.message : 'The script threw something without words.',
    ...(wholeNumber(thrown.line) ? { line: thrown.line } : {}),
    ...(wholeNumber(thrown.line) && wholeNumber(thrown.column) ? { column: thrown.column } : {}),
  };
}

/** Scripts in QuickJS: each begins with the same memory, the maths library loaded. */
class QuickJsEngine implements ScriptEngine {
  private readonly wasm: Uint8Array<ArrayBuffer>;
  private readonly snapshot: Uint8Array;
  private instance: QuickJsInstance | null;
  /** Whether the memory is that of the snapshot, with nothing run in it since. */
  private fresh = false;
  private mending: Promise<void> | null = null;

  constructor(wasm: Uint8Array<ArrayBuffer>, snapshot: Uint8Array, instance: QuickJsInstance) {
    this.wasm = wasm;
    this.snapshot = snapshot;
    this.instance = instance;
  }

  run(
    text: string,
    globals: Readonly<Record<string, unknown>>,
    seed: string,
    interrupt: () => boolean,
  ): ScriptRun {
    const instance = this.instance;
    if (instance === null) throw new Error('The sandbox has to be made anew first.');
    // Until the run has ended in good order the instance counts as spoilt: an exception of the host's stack or of
    // WebAssembly leaves QuickJS in the middle of something.
    this.instance = null;
    if (!this.fresh) instance.restore(this.snapshot);
    this.fresh = false;
    const run = this.runIn(instance, text, globals, seed, interrupt);
    if (instance.size <= largestKept) this.instance = instance;
    return run;
  }

  mend(): Promise<void> {
    this.mending ??= this.makeFresh().finally(() => {
      this.mending = null;
    });
    return this.mending;
  }

  private async makeFresh(): Promise<void> {
    this.instance ??= await QuickJsInstance.make(this.wasm);
    if (!this.fresh) this.instance.restore(this.snapshot);
    this.fresh = true;
  }

  private runIn(
    instance: QuickJsInstance,
    text: string,
    globals: Readonly<Record<string, unknown>>,
    seed: string,
    interrupt: () => boolean,
  ): ScriptRun {
    const { context } = instance;
    const host = instance.evaluate('engineHost', 'host');
    const runFunction = context.getProp(host, 'run');
    const printedFunction = context.getProp(host, 'printed');
    const given = [
      text,
      JSON.stringify(Object.keys(globals)),
      JSON.stringify(Object.values(globals)),
      seed,
    ].map((argument) => context.newString(argument));
    let interrupted = false;
    const asked = () => (interrupted ||= interrupt());
    const result = instance.withInterrupt(asked, () =>
      context.callFunction(runFunction, context.undefined, ...given),
    );
    const printed = this.printedBy(instance, printedFunction);
    if (result.error !== undefined) {
      return interrupted ? { ended: 'interrupted', printed } : { ended: 'memory', printed };
    }
    return readEnvelope(context.getString(result.value), printed);
  }

  /** Fetches the printed lines; a guest that spoilt its own printing has printed nothing. */
  private printedBy(instance: QuickJsInstance, printedFunction: QuickJSHandle): string[] {
    const { context } = instance;
    let polls = 0;
    const result = instance.withInterrupt(
      () => ++polls > pollsAfterEnd,
      () => context.callFunction(printedFunction, context.undefined),
    );
    if (result.error !== undefined) return [];
    try {
      return textsOf(JSON.parse(context.getString(result.value)));
    } catch {
      return [];
    }
  }
}

/** An engine for scripts that has to be mended after a run that spoilt it. */
export type MendableScriptEngine = ScriptEngine & {
  /**
   * Makes the sandbox ready again after a run, so that nothing of it is left; where that is done between runs, the next
   * one need not wait for it.
   */
  mend(): Promise<void>;
};

/**
 * Loads the sandbox.
 *
 * @param wasm bytes of QuickJS
 * @param snapshot made by `makeSnapshot` from the same bytes
 */
export async function loadScriptEngine(
  wasm: Uint8Array<ArrayBuffer>,
  snapshot: Uint8Array,
): Promise<MendableScriptEngine> {
  return new QuickJsEngine(wasm, snapshot, await QuickJsInstance.make(wasm));
}
