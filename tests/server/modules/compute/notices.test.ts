import type { CellNotice, PlanNotice } from '@stillroom/shared/protocol';
import * as decoding from 'lib0/decoding';
import { describe, expect, test } from 'vitest';
import { planFrame } from '../../../../packages/server/src/modules/compute/notices.ts';

const notice = (id: string): CellNotice => ({
  id,
  state: 'current',
  digest: 'sha256:d',
  shown: null,
  draws: [],
});

function read(frame: Uint8Array): PlanNotice {
  const decoder = decoding.createDecoder(frame);
  expect(decoding.readVarUint(decoder)).toBe(5);
  return JSON.parse(decoding.readVarString(decoder)) as PlanNotice;
}

describe('the frame of a plan', () => {
  test('holds the notices, with results set in as they are', () => {
    const json = '{"a":[1,2.50,"x"]}';
    const plan = read(
      planFrame(
        true,
        [
          { notice: notice('one'), json },
          { notice: notice('two'), json: null },
        ],
        [],
      ),
    );
    expect(plan).toEqual({
      whole: true,
      cells: [{ ...notice('one'), result: { a: [1, 2.5, 'x'] } }, notice('two')],
    });
  });

  test('names the cells that are gone', () => {
    expect(read(planFrame(false, [], ['old']))).toEqual({ whole: false, cells: [], gone: ['old'] });
  });

  test('leaves out results beyond what one frame should carry; they are fetched', () => {
    const json = JSON.stringify('x'.repeat(400_000));
    const news = ['one', 'two', 'three'].map((id) => ({ notice: notice(id), json }));
    const { cells } = read(planFrame(true, news, []));
    expect(cells.map(({ result }) => result !== undefined)).toEqual([true, true, false]);
  });
});
