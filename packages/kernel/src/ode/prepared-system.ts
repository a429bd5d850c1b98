import { assemble, type Assembly, type Backend, type Routine } from '../program/index.ts';
import { methods } from './methods/registry.ts';
import type { Counters, Stepper } from './methods/method.ts';
import type { MethodKind } from './methods/registry.ts';
import { type OdeSystem, parameterSlot, type SparsePattern, timeSlot } from './problem.ts';
import { type CommonWorkspace, commonWorkspace, Layout } from './workspace.ts';

/** A system made ready: memory, routines and methods, to be run any number of times. */
export interface PreparedSystem {
  readonly system: OdeSystem;
  readonly assembly: Assembly;
  readonly common: CommonWorkspace;
  stepper(kind: MethodKind, counters: Counters): Stepper;
  /** A view of the vector that begins at `slot`. */
  vector(slot: number): Float64Array;
  /** The present values of the parameters. */
  readonly parameters: Float64Array;
  setParameters(values: Float64Array): void;
  setParameter(index: number, value: number): void;
  /** f(t, y) into `out`; both are slots of vectors in memory. */
  rightHandSide(time: number, state: number, out: number): void;
  /** The largest entry on the diagonal of ∂f/∂y at a time and a state (a slot): about the fastest rate of decay. */
  fastestRate(time: number, state: number): number;
  /** The value of one of the system's functions at a time and a state (a slot); the array is reused by the next call. */
  evaluate(name: string, time: number, state: number): Float64Array;
}

/** How a system is prepared. */
export interface PrepareOptions {
  /** The methods; all by default. */
  readonly kinds?: readonly MethodKind[];
  readonly backend?: Backend;
  /** Called often while it is prepared, and later where tables are made; throws PreparationStopped to end the work. */
  readonly checkpoint?: () => void;
}

/** Assembles the routines of a system for the given methods. The same bits come from either backend. */
export function prepareSystem(system: OdeSystem, options: PrepareOptions = {}): PreparedSystem {
  const { kinds = ['nonstiff', 'stiff'], backend, checkpoint = () => undefined } = options;
  const layout = new Layout(system.parameters);
  const common = commonWorkspace(system, layout);
  const prepared = new Map(
    kinds.map((kind) => [kind, methods[kind].prepare(system, common, layout, checkpoint)]),
  );
  const assembly = assemble(
    layout.slots,
    (memory) => {
      const routines = new Map<string, Routine>([
        ['rightHandSide', { kind: 'straight', tapes: system.rightHandSide }],
        ['jacobian', { kind: 'straight', tapes: system.jacobian }],
      ]);
      for (const { name, tapes } of system.functions)
        routines.set(`function.${name}`, { kind: 'straight', tapes });
      for (const method of prepared.values()) {
        for (const [name, routine] of method.routines(memory)) routines.set(name, routine);
      }
      return routines;
    },
    { backend, checkpoint },
  );
  const { memory } = assembly;
  const rightHandSide = assembly.routine('rightHandSide');
  const jacobian = assembly.routine('jacobian');
  const diagonal = diagonalEntries(system.pattern);
  const functions = new Map(
    system.functions.map(({ name, length }) => {
      const place = common.functions.get(name)!;
      const run = assembly.routine(`function.${name}`);
      return [name, { run, place, values: memory.subarray(place, place + length) }];
    }),
  );
  return {
    system,
    assembly,
    common,
    stepper(kind, counters) {
      const method = prepared.get(kind);
      if (method === undefined) throw new Error(`The system was not prepared for the method "${kind}".`);
      return method.stepper(assembly, counters);
    },
    vector: (slot) => memory.subarray(slot, slot + system.dimension),
    parameters: memory.subarray(parameterSlot(0), parameterSlot(system.parameters)),
    setParameters: (values) => memory.set(values, parameterSlot(0)),
    setParameter: (index, value) => {
      memory[parameterSlot(index)] = value;
    },
    rightHandSide(time, state, out) {
      memory[timeSlot] = time;
      rightHandSide(state, out);
    },
    fastestRate(time, state) {
      memory[timeSlot] = time;
      jacobian(state, common.jacobian);
      let fastest = 0;
      for (const entry of diagonal) fastest = Math.max(fastest, Math.abs(memory[common.jacobian + entry]!));
      return fastest;
    },
    evaluate(name, time, state) {
      const entry = functions.get(name);
      if (entry === undefined) throw new Error(`The system has no function "${name}".`);
      memory[timeSlot] = time;
      entry.run(state, entry.place);
      return entry.values;
    },
  };
}

/** Places of the diagonal among the entries of a pattern. */
function diagonalEntries({ size, rowStart, columns }: SparsePattern): Int32Array {
  const entries: number[] = [];
  for (let i = 0; i < size; i++) {
    const entry = columns.indexOf(i, rowStart[i]);
    if (entry >= 0 && entry < rowStart[i + 1]!) entries.push(entry);
  }
  return Int32Array.from(entries);
}
