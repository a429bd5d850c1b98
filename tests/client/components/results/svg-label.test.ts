import { expect, test } from 'vitest';
import { labelParts } from '../../../../packages/client/src/components/results/SvgLabel.ts';

const spelt = (label: string) => labelParts(label).map(({ text, index }) => (index ? `_${text}` : text));

test('indices are taken out of their brackets, wherever they stand', () => {
  expect(spelt('2 T[0,1] + X')).toEqual(['2 T', '_0,1', ' + X']);
  expect(spelt('X[1] + X[2]')).toEqual(['X', '_1', ' + X', '_2']);
});

test('a label without an index is one part, and the empty one none', () => {
  expect(spelt('A + B')).toEqual(['A + B']);
  expect(spelt('')).toEqual([]);
});
