import { planNotebook } from '@stillroom/shared/plan';
import { limits } from '@stillroom/shared/protocol';
import { expect, test } from 'vitest';

const prose = (id: string, text: string) => ({ id, kind: 'prose' as const, name: '', text, settings: {} });

test('a text beyond what a cell takes is not read, and says so; other cells go on', () => {
  const plan = planNotebook([prose('long', 'x'.repeat(limits.cellText + 1)), prose('short', 'Words')]);
  expect(plan.byId.get('long')).toMatchObject({
    digest: null,
    problem: { message: expect.stringContaining('2000001') as string },
  });
  expect(plan.byId.get('short')?.digest).toMatch(/^sha256:/u);
});
