import { printExpression } from '@stillroom/shared/expression';
import { readNetwork } from '@stillroom/shared/notation';
import { expect, test } from 'vitest';

test('a value derived from other constants comes with its expression, a plain one without', () => {
  const { network } = readNetwork(
    'let a = 3, b = 2*a, c = 1/3\n[i = 1..2] X[i] -> 0 | p[i]\nlet p[i] = b/i for i = 1..2\n',
  );
  const derived = network!.constants.map(({ name, quantity, expression }) => [
    name,
    quantity?.value,
    expression === undefined ? null : printExpression(expression),
  ]);
  expect(derived).toEqual([
    ['a', 3, null],
    ['b', 6, '2*a'],
    ['c', 1 / 3, null],
    ['p[1]', 6, 'b/1'],
    ['p[2]', 3, 'b/2'],
  ]);
});

test('a value derived from one that the text leaves open has its expression and no number', () => {
  const { network } = readNetwork('A -> B | k\nB -> A | q\nlet q = 2*k\n');
  const q = network!.constants.find(({ name }) => name === 'q')!;
  expect(q.quantity).toBeNull();
  expect(printExpression(q.expression!)).toBe('2*k');
});

test('a start or a fixed value that draws on constants has its expression, a plain one has none', () => {
  const { network } = readNetwork(
    'let a = 3, b = 2*a\nA + B + C -> 0 | k = 1\nstart A = (2*b), B = 4\nfix C = (a + 1)\n',
  );
  const shown = [...network!.start, ...network!.fixed].map(([species, { value, expression }]) => [
    network!.species[species],
    value,
    expression === undefined ? null : printExpression(expression),
  ]);
  expect(shown).toEqual([
    ['A', 12, '2*b'],
    ['B', 4, null],
    ['C', 4, 'a + 1'],
  ]);
});
