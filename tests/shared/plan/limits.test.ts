import { newPlanMemory, plainText, planNotebook } from '@stillroom/shared/plan';
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

test('cells beyond what a notebook holds are not read, and say so; they count again when they move up', () => {
  const memory = newPlanMemory();
  const cells = Array.from({ length: limits.cells + 1 }, (_, place) => prose(`c${place}`, `Words ${place}`));
  const last = `c${limits.cells}`;
  const plan = planNotebook(cells, memory);
  expect(plan.byId.get(last)).toMatchObject({
    digest: null,
    problem: { message: expect.stringContaining('at most 1000 cells') as string },
  });
  expect(plan.byId.get('c0')?.digest).toMatch(/^sha256:/u);
  expect(planNotebook(cells.slice(1), memory).byId.get(last)?.digest).toMatch(/^sha256:/u);
});

test('a long run of blanks that does not end its line is read in one go', () => {
  const text = `a${' '.repeat(limits.cellText - 2)}b`;
  expect(plainText(text)).toBe(text);
  expect(plainText(`a${' '.repeat(1000)}\nb \t\n`)).toBe('a\nb\n');
});

test('a claim or a plot too deep to be read says so; other cells go on', () => {
  const cells = [
    { ...prose('claim', `${'a.b + '.repeat(300_000)}1 > 0`), kind: 'claim' as const, name: 'deep' },
    { ...prose('plot', '['.repeat(900_000) + ']'.repeat(900_000)), kind: 'plot' as const, name: 'deeper' },
    prose('short', 'Words'),
  ];
  const { byId } = planNotebook(cells);
  for (const id of ['claim', 'plot']) expect(byId.get(id)?.problem?.message).toContain('too deep to be read');
  expect(byId.get('short')?.digest).toMatch(/^sha256:/u);
});

test('characters that cannot be kept everywhere are read as the sign for what could not be read', () => {
  expect(plainText('a\0b\uD800c')).toBe('a\uFFFDb\uFFFDc');
});
