import { ByteWriter, instruction, ModuleBuilder, valueType } from '@stillroom/kernel/wasm';
import { expect, test } from 'vitest';

test('a module with an import, two functions and a memory is valid and runs', () => {
  const builder = new ModuleBuilder();
  const twice = builder.importFunction('twice', [valueType.f64], [valueType.f64]);
  const body = new ByteWriter();
  body.byte(instruction.localGet);
  body.unsigned(0);
  body.byte(instruction.call);
  body.unsigned(twice);
  const quadruple = builder.define([valueType.f64], [valueType.f64], [], doubled(body, twice));
  const store = new ByteWriter();
  store.byte(instruction.i32Const);
  store.signed(8);
  store.byte(instruction.f64Const);
  store.float64(5);
  store.byte(instruction.call);
  store.unsigned(quadruple);
  store.byte(instruction.f64Store);
  store.unsigned(3);
  store.unsigned(0);
  builder.export('quadruple', quadruple);
  builder.export('store', builder.define([], [], [], store));
  const bytes = builder.finish(1);
  expect(WebAssembly.validate(bytes)).toBe(true);

  const memory = new WebAssembly.Memory({ initial: 1 });
  const engine = { memory, twice: (x: number) => 2 * x };
  const { exports } = new WebAssembly.Instance(new WebAssembly.Module(bytes), { engine });
  const [run, write] = [exports['quadruple'], exports['store']] as ((x?: number) => number)[];
  expect(run!(1.5)).toBe(6);
  write!();
  expect(new Float64Array(memory.buffer)[1]).toBe(20);
});

test('imports come before definitions', () => {
  const builder = new ModuleBuilder();
  builder.define([], [], [], new ByteWriter());
  expect(() => builder.importFunction('late', [], [])).toThrow('before any is defined');
});

function doubled(body: ByteWriter, twice: number): ByteWriter {
  body.byte(instruction.call);
  body.unsigned(twice);
  return body;
}
