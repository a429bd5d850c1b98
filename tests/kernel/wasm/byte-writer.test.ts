import { ByteWriter } from '@stillroom/kernel/wasm';
import { describe, expect, test } from 'vitest';

const written = (write: (bytes: ByteWriter) => void): number[] => {
  const bytes = new ByteWriter(1);
  write(bytes);
  return [...bytes.finish()];
};

/** The examples of the LEB128 description in the DWARF 4 standard, section 7.6. */
describe('numbers of variable length', () => {
  test.each([
    [2, [2]],
    [127, [0x7f]],
    [128, [0x80, 1]],
    [129, [0x81, 1]],
    [12857, [0xb9, 0x64]],
  ])('unsigned %d', (value, bytes) => expect(written((out) => out.unsigned(value))).toEqual(bytes));

  test.each([
    [2, [2]],
    [-2, [0x7e]],
    [127, [0xff, 0]],
    [-127, [0x81, 0x7f]],
    [128, [0x80, 1]],
    [-128, [0x80, 0x7f]],
    [-129, [0xff, 0x7e]],
  ])('signed %d', (value, bytes) => expect(written((out) => out.signed(value))).toEqual(bytes));

  test('a double is little-endian, names and parts carry their length', () => {
    expect(written((out) => out.float64(1))).toEqual([0, 0, 0, 0, 0, 0, 0xf0, 0x3f]);
    expect(written((out) => out.name('ab'))).toEqual([2, 97, 98]);
    const part = new ByteWriter();
    part.byte(7);
    expect(written((out) => out.sized(part))).toEqual([1, 7]);
  });
});
