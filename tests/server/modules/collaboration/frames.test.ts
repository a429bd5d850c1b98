import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { isEmptyUpdate, readFrame } from '../../../../packages/server/src/modules/collaboration/frames.ts';
import { frames } from '../../../support/live-frames.ts';

describe('frames from outside', () => {
  test('of the protocol are read as what they are', () => {
    expect(readFrame(frames.update(new Uint8Array([0, 0])))).toMatchObject({ kind: 'update' });
    expect(readFrame(frames.step2(new Uint8Array([0, 0])))).toMatchObject({ kind: 'step2' });
    expect(readFrame(frames.awareness(1, null))).toMatchObject({ kind: 'awareness' });
  });

  test('cut short, too long or made up are none, and never throw', () => {
    const whole = frames.update(new Uint8Array([1, 2, 3]));
    for (let length = 0; length < whole.length; length += 1)
      expect(readFrame(whole.subarray(0, length))).toBeNull();
    expect(readFrame(new Uint8Array([...whole, 0]))).toBeNull();
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 40 }), (bytes) => {
        const read = readFrame(bytes);
        return read === null || (bytes[0] ?? 9) <= 1;
      }),
      { seed: 7, numRuns: 2000 },
    );
  });

  test('only the update without structs and deletions is empty', () => {
    expect(isEmptyUpdate(new Uint8Array([0, 0]))).toBe(true);
    expect(isEmptyUpdate(new Uint8Array([0, 1]))).toBe(false);
    expect(isEmptyUpdate(new Uint8Array([0, 0, 0]))).toBe(false);
  });
});
