import { evaluateCell } from '@stillroom/kernel/engine';
import { describe, expect, test, vi } from 'vitest';
import { warmUp } from '../../../packages/kernel/src/worker/warm-up.ts';

vi.mock(import('../../../packages/kernel/src/engine/index.ts'), async (load) => {
  const engine = await load();
  return { ...engine, evaluateCell: vi.fn(engine.evaluateCell) };
});

const evaluate = vi.mocked(evaluateCell);
const settled = () => new Promise((resolve) => setTimeout(resolve, 100));

describe('the warm-up of an engine process', () => {
  test('computes a few courses, all of which come out right', async () => {
    evaluate.mockClear();
    warmUp();
    await vi.waitFor(() => expect(evaluate).toHaveBeenCalledTimes(6), { timeout: 20_000 });
    for (const { value } of evaluate.mock.results) {
      expect(value).toMatchObject({
        status: 'ok',
        warnings: [],
        result: { ended: 'complete', statistics: { method: 'Dormand–Prince 5(4), then Rodas5P' } },
      });
    }
  });

  test('is not begun where a job comes first', async () => {
    evaluate.mockClear();
    warmUp()();
    await settled();
    expect(evaluate).not.toHaveBeenCalled();
  });
});
