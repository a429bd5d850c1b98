import { operations } from './graph.ts';
import { hostFunctions } from './host-functions.ts';
import type { Tape } from './tape.ts';

/**
 * Runs a tape once on `memory`; `values` is scratch space of at least `tape.size`. Bit for bit what the WebAssembly of
 * emit.ts does.
 */
export function interpret(
  tape: Tape,
  memory: Float64Array,
  first: number,
  second: number,
  values: Float64Array,
): void {
  const { operation, left, right, third, constants, outputs } = tape;
  const bases = [0, first, second];
  for (let i = 0; i < tape.size; i++) {
    const a = left[i]!;
    const b = right[i]!;
    values[i] = evaluate(operation[i]!, a, b, third[i]!, constants[i]!, values, memory, bases);
  }
  for (const { node, slot, space } of outputs) memory[bases[space]! + slot] = values[node]!;
}

function evaluate(
  operation: number,
  a: number,
  b: number,
  c: number,
  constant: number,
  values: Float64Array,
  memory: Float64Array,
  bases: readonly number[],
): number {
  switch (operation) {
    case operations.constant:
      return constant;
    case operations.load:
      return memory[bases[b]! + a]!;
    case operations.add:
      return values[a]! + values[b]!;
    case operations.subtract:
      return values[a]! - values[b]!;
    case operations.multiply:
      return values[a]! * values[b]!;
    case operations.divide:
      return values[a]! / values[b]!;
    case operations.negate:
      return -values[a]!;
    case operations.abs:
      return Math.abs(values[a]!);
    case operations.sqrt:
      return Math.sqrt(values[a]!);
    case operations.min:
      return Math.min(values[a]!, values[b]!);
    case operations.max:
      return Math.max(values[a]!, values[b]!);
    case operations.floor:
      return Math.floor(values[a]!);
    case operations.ceil:
      return Math.ceil(values[a]!);
    case operations.less:
      return values[a]! < values[b]! ? 1 : 0;
    case operations.lessEqual:
      return values[a]! <= values[b]! ? 1 : 0;
    case operations.equal:
      return values[a]! === values[b]! ? 1 : 0;
    case operations.select:
      return values[a]! !== 0 ? values[b]! : values[c]!;
    case operations.call:
      return hostFunctions[c]!.call(values[a]!, values[b]!);
    default:
      throw new Error(`There is no operation ${operation}.`);
  }
}
