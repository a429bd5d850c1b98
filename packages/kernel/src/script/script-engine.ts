/** What a script left behind. `value` and `printed` are as the guest wrote them, as JSON text. */
export type ScriptRun =
  | {
      readonly ended: 'returned';
      readonly printed: readonly string[];
      readonly value: unknown;
      readonly notes: readonly string[];
    }
  | {
      readonly ended: 'threw';
      readonly printed: readonly string[];
      readonly message: string;
      /** 1-based place in the text, where the guest knows it. */
      readonly line?: number;
      readonly column?: number;
    }
  /** The interrupt asked for it. */
  | { readonly ended: 'interrupted'; readonly printed: readonly string[] }
  /** The memory of the sandbox was used up. */
  | { readonly ended: 'memory'; readonly printed: readonly string[] };
/** A sandbox that runs authors' JavaScript and nothing else can be reached from. */
export interface ScriptEngine {
  /**
   * Runs a text as the body of a function.
   *
   * @param text the script; it hands its value back with `return`
   * @param globals JSON values that it sees under their names
   * @param seed what `random()` begins with
   * @param interrupt asked now and then while the guest computes; true ends the run
   */
  run(
    text: string,
    globals: Readonly<Record<string, unknown>>,
    seed: string,
    interrupt: () => boolean,
  ): ScriptRun;
}
