import { ByteWriter, type FunctionIndex, instruction, ModuleBuilder, valueType } from '../wasm/index.ts';
import { emitTape } from './emit.ts';
import { hostFunctions } from './host-functions.ts';
import { interpret } from './interpret.ts';
import type { Tape } from './tape.ts';

/** One call inside a sequence: the routine and the two bases (slots) that it gets. */
export interface Call {
  readonly routine: string;
  readonly first?: number;
  readonly second?: number;
}

/**
 * A named piece of a program. `straight`: tapes one after the other. `loop`: one tape `count` times, both bases
 * advancing by one slot each time. `sequence`: calls of routines named earlier. `host`: a function outside.
 */
export type Routine =
  | { readonly kind: 'straight'; readonly tapes: readonly Tape[] }
  | { readonly kind: 'loop'; readonly tape: Tape; readonly count: number }
  | { readonly kind: 'sequence'; readonly calls: readonly Call[] }
  | { readonly kind: 'host'; readonly run: RunRoutine };

/** Runs a routine with its bases, in slots; a base that no tape of the routine uses may be left out. */
export type RunRoutine = (first?: number, second?: number) => void;

export type Backend = 'wasm' | 'interpreted';

/** A program ready to run on its own memory of 64-bit floating-point slots. */
export interface Assembly {
  readonly memory: Float64Array;
  readonly backend: Backend;
  routine(name: string): RunRoutine;
}

/**
 * Makes a program of named routines over `slots` numbers. `makeRoutines` is given the memory, for host routines that
 * work on it; routines are named before they are called. Unless a backend is asked for, WebAssembly is taken wherever
 * the host has it and its content policy lets it be compiled. Both backends give the same bits.
 */
export function assemble(
  slots: number,
  makeRoutines: MakeRoutines,
  { backend, checkpoint }: AssembleOptions = {},
): Assembly {
  const wanted = backend ?? (typeof WebAssembly === 'object' ? 'wasm' : 'interpreted');
  if (wanted === 'interpreted') return assembleInterpreted(slots, makeRoutines);
  try {
    return assembleModule(slots, makeRoutines, checkpoint);
  } catch (error) {
    if (backend !== undefined || !(error instanceof WebAssembly.CompileError)) throw error;
    return assembleInterpreted(slots, makeRoutines);
  }
}

export interface AssembleOptions {
  readonly backend?: Backend | undefined;
  /** Called between routines; may throw to end the work. */
  readonly checkpoint?: () => void;
}

type MakeRoutines = (memory: Float64Array) => ReadonlyMap<string, Routine>;

function missing(name: string): Error {
  return new Error(`The program has no routine "${name}" at this point.`);
}

function assembleInterpreted(slots: number, makeRoutines: MakeRoutines): Assembly {
  const memory = new Float64Array(slots);
  const routines = makeRoutines(memory);
  const runs = new Map<string, RunRoutine>();
  const routine = (name: string): RunRoutine => {
    const run = runs.get(name);
    if (run === undefined) throw missing(name);
    return run;
  };
  let values = new Float64Array(0);
  const scratch = (tape: Tape): Float64Array => {
    if (values.length < tape.size) values = new Float64Array(tape.size);
    return values;
  };
  for (const [name, part] of routines) runs.set(name, interpreted(part, memory, scratch, routine));
  return { memory, backend: 'interpreted', routine };
}

function interpreted(
  part: Routine,
  memory: Float64Array,
  scratch: (tape: Tape) => Float64Array,
  routine: (name: string) => RunRoutine,
): RunRoutine {
  switch (part.kind) {
    case 'straight':
      return (first = 0, second = 0) => {
        for (const tape of part.tapes) interpret(tape, memory, first, second, scratch(tape));
      };
    case 'loop':
      return (first = 0, second = 0) => {
        const values = scratch(part.tape);
        for (let i = 0; i < part.count; i++) interpret(part.tape, memory, first + i, second + i, values);
      };
    case 'sequence': {
      const calls = part.calls.map((call) => ({ ...call, run: routine(call.routine) }));
      return () => {
        for (const { run, first, second } of calls) run(first, second);
      };
    }
    case 'host':
      return part.run;
  }
}

/** Before tapes of this size the checkpoint is called. */
const longTape = 1000;
const bases = [valueType.i32, valueType.i32];
const pageBytes = 65536;

function assembleModule(
  slots: number,
  makeRoutines: MakeRoutines,
  checkpoint: () => void = () => undefined,
): Assembly {
  const pages = Math.max(1, Math.ceil((slots * 8) / pageBytes));
  const storage = new WebAssembly.Memory({ initial: pages });
  const memory = new Float64Array(storage.buffer, 0, slots);
  const routines = makeRoutines(memory);

  const builder = new ModuleBuilder();
  const imports: Record<string, WebAssembly.ImportValue> = { memory: storage };
  const hosts = hostFunctions.map(({ name, arity, call }) => {
    imports[name] = call;
    return builder.importFunction(name, new Array(arity).fill(valueType.f64), [valueType.f64]);
  });
  const indices = new Map<string, FunctionIndex>();
  for (const [name, part] of routines) {
    if (part.kind !== 'host') continue;
    imports[name] = (first: number, second: number) => part.run(first >> 3, second >> 3);
    indices.set(name, builder.importFunction(name, bases, []));
  }
  for (const [name, part] of routines) {
    if (part.kind === 'host') continue;
    indices.set(name, defineRoutine(builder, part, hosts, indices, checkpoint));
  }
  for (const [name, index] of indices) builder.export(name, index);

  const module = new WebAssembly.Module(builder.finish(pages));
  const instance = new WebAssembly.Instance(module, { engine: imports });
  return {
    memory,
    backend: 'wasm',
    routine(name) {
      const run = instance.exports[name];
      if (typeof run !== 'function') throw missing(name);
      return (first = 0, second = 0) => run(first << 3, second << 3) as void;
    },
  };
}

function defineRoutine(
  builder: ModuleBuilder,
  part: Exclude<Routine, { kind: 'host' }>,
  hosts: readonly FunctionIndex[],
  indices: ReadonlyMap<string, FunctionIndex>,
  checkpoint: () => void,
): FunctionIndex {
  switch (part.kind) {
    case 'straight': {
      const parts = part.tapes.map((tape) => {
        if (tape.size >= longTape) checkpoint();
        return defineTape(builder, tape, hosts);
      });
      if (parts.length === 1) return parts[0]!;
      const body = new ByteWriter(parts.length * 8);
      for (const index of parts) {
        pushLocal(body, 0);
        pushLocal(body, 1);
        call(body, index);
      }
      return builder.define(bases, [], [], body);
    }
    case 'loop':
      return defineLoop(builder, part.tape, part.count, hosts);
    case 'sequence': {
      const body = new ByteWriter(part.calls.length * 12);
      for (const { routine, first = 0, second = 0 } of part.calls) {
        const index = indices.get(routine);
        if (index === undefined) throw missing(routine);
        pushConstant(body, first << 3);
        pushConstant(body, second << 3);
        call(body, index);
      }
      return builder.define(bases, [], [], body);
    }
  }
}

function defineTape(builder: ModuleBuilder, tape: Tape, hosts: readonly FunctionIndex[]): FunctionIndex {
  const body = new ByteWriter(tape.size * 8);
  const count = emitTape(tape, hosts, body);
  return builder.define(bases, [], [{ count, type: valueType.f64 }], body);
}

/** Both bases advance by one slot until the first has gone `count` slots. */
function defineLoop(
  builder: ModuleBuilder,
  tape: Tape,
  count: number,
  hosts: readonly FunctionIndex[],
): FunctionIndex {
  const inner = new ByteWriter(tape.size * 8);
  const numbers = emitTape(tape, hosts, inner);
  const end = 2 + numbers;
  const body = new ByteWriter(inner.length + 64);
  if (count > 0) {
    pushLocal(body, 0);
    pushConstant(body, count * 8);
    body.byte(instruction.i32Add);
    setLocal(body, end);
    body.byte(instruction.loop);
    body.byte(valueType.empty);
    body.append(inner);
    for (const base of [1, 0]) {
      pushLocal(body, base);
      pushConstant(body, 8);
      body.byte(instruction.i32Add);
      setLocal(body, base);
    }
    pushLocal(body, 0);
    pushLocal(body, end);
    body.byte(instruction.i32LessUnsigned);
    body.byte(instruction.branchIf);
    body.unsigned(0);
    body.byte(instruction.end);
  }
  const locals = [
    { count: numbers, type: valueType.f64 },
    { count: 1, type: valueType.i32 },
  ];
  return builder.define(bases, [], locals, body);
}

function pushLocal(body: ByteWriter, index: number): void {
  body.byte(instruction.localGet);
  body.unsigned(index);
}

function setLocal(body: ByteWriter, index: number): void {
  body.byte(instruction.localSet);
  body.unsigned(index);
}

function pushConstant(body: ByteWriter, value: number): void {
  body.byte(instruction.i32Const);
  body.signed(value);
}

function call(body: ByteWriter, index: FunctionIndex): void {
  body.byte(instruction.call);
  body.unsigned(index);
}
