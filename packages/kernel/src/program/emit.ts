import type { ByteWriter } from '../wasm/index.ts';
import { type FunctionIndex, instruction } from '../wasm/index.ts';
import { operandCounts, operations, spaces } from './graph.ts';
import { hostFunctions } from './host-functions.ts';
import type { Tape } from './tape.ts';

/** Local variables 0 and 1 of every routine are its two bases, in bytes; numbers come after them. */
const firstNumberLocal = 2;
const bytesPerSlot = 8;
/** An expression nested deeper than this is cut by a local, so that neither we nor the compiler recurse too far. */
const deepestExpression = 60;

const unary: Readonly<Record<number, number>> = {
  [operations.negate]: instruction.f64Negate,
  [operations.abs]: instruction.f64Abs,
  [operations.sqrt]: instruction.f64Sqrt,
  [operations.floor]: instruction.f64Floor,
  [operations.ceil]: instruction.f64Ceil,
};

const binary: Readonly<Record<number, number>> = {
  [operations.add]: instruction.f64Add,
  [operations.subtract]: instruction.f64Subtract,
  [operations.multiply]: instruction.f64Multiply,
  [operations.divide]: instruction.f64Divide,
  [operations.min]: instruction.f64Min,
  [operations.max]: instruction.f64Max,
};

const comparison: Readonly<Record<number, number>> = {
  [operations.less]: instruction.f64Less,
  [operations.lessEqual]: instruction.f64LessEqual,
  [operations.equal]: instruction.f64Equal,
};

/**
 * Writes the instructions of a tape: shared values and values that the outputs overwrite go to locals, the rest stays
 * on the stack. Returns how many number locals it takes. `hosts` are the imported functions by host number.
 */
export function emitTape(tape: Tape, hosts: readonly FunctionIndex[], body: ByteWriter): number {
  const { operation, left, right, third, constants } = tape;
  const keep = chooseLocals(tape);
  const local = new Int32Array(tape.size).fill(-1);
  let locals = 0;

  const address = (space: number): void => {
    if (space === spaces.fixed) {
      body.instruction(instruction.i32Const, 0);
    } else {
      body.instruction(instruction.localGet, space - spaces.first);
    }
  };
  const use = (node: number): void => {
    if (local[node]! < 0) return write(node);
    body.instruction(instruction.localGet, firstNumberLocal + local[node]!);
  };
  const test = (node: number): void => {
    const code = comparison[operation[node]!];
    if (code !== undefined && local[node]! < 0) {
      use(left[node]!);
      use(right[node]!);
      body.byte(code);
    } else {
      use(node);
      body.byte(instruction.f64Const);
      body.float64(0);
      body.byte(instruction.f64NotEqual);
    }
  };
  const write = (node: number): void => {
    const kind = operation[node]!;
    const a = left[node]!;
    const b = right[node]!;
    const c = third[node]!;
    if (kind === operations.constant) {
      body.byte(instruction.f64Const);
      body.float64(constants[node]!);
    } else if (kind === operations.load) {
      address(b);
      body.instruction(instruction.f64Load, 3);
      body.unsigned(a * bytesPerSlot);
    } else if (kind === operations.select) {
      use(b);
      use(c);
      test(a);
      body.byte(instruction.select);
    } else if (kind === operations.call) {
      use(a);
      if (hostFunctions[c]!.arity === 2) use(b);
      body.instruction(instruction.call, hosts[c]!);
    } else if (comparison[kind] !== undefined) {
      test(node);
      body.byte(instruction.f64ConvertUnsigned);
    } else {
      use(a);
      const two = binary[kind];
      if (two !== undefined) use(b);
      body.byte(two ?? unary[kind]!);
    }
  };

  for (let node = 0; node < tape.size; node++) {
    if (keep[node] === 0) continue;
    write(node);
    body.instruction(instruction.localSet, firstNumberLocal + locals);
    local[node] = locals++;
  }
  for (const { node, slot, space } of tape.outputs) {
    address(space);
    use(node);
    body.instruction(instruction.f64Store, 3);
    body.unsigned(slot * bytesPerSlot);
  }
  return locals;
}

/** Which values go to locals: those used more than once, those nested too deep, loads of slots that are overwritten. */
function chooseLocals(tape: Tape): Uint8Array {
  const { size, operation, left, right, third, outputs } = tape;
  const uses = new Uint32Array(size);
  const depth = new Uint32Array(size);
  const keep = new Uint8Array(size);
  const overwritten = overwrittenSlots(tape);
  const use = (part: number): number => {
    uses[part]!++;
    return keep[part] === 0 ? depth[part]! : 0;
  };
  for (let node = 0; node < size; node++) {
    const kind = operation[node]!;
    if (kind === operations.load && overwritten?.has(left[node]! * 4 + right[node]!) === true) keep[node] = 1;
    const count = operandCounts[kind]!;
    if (count === 0) continue;
    let deepest = use(left[node]!);
    if (count > 1) deepest = Math.max(deepest, use(right[node]!));
    if (count > 2) deepest = Math.max(deepest, use(third[node]!));
    depth[node] = deepest + 1;
    if (deepest >= deepestExpression) keep[node] = 1;
  }
  for (const { node } of outputs) uses[node]!++;
  for (let node = 0; node < size; node++) {
    if (uses[node]! > 1 && operation[node] !== operations.constant) keep[node] = 1;
  }
  return keep;
}

/** Slots that the outputs overwrite, as 4 · slot + space; null where no load is from a space with outputs. */
function overwrittenSlots({ size, operation, right, outputs }: Tape): Set<number> | null {
  const written = [false, false, false];
  for (const { space } of outputs) written[space] = true;
  for (let node = 0; node < size; node++) {
    if (operation[node] !== operations.load || written[right[node]!] !== true) continue;
    return new Set(outputs.map(({ slot, space }) => slot * 4 + space));
  }
  return null;
}
