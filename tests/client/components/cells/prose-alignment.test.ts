import { expect, test } from 'vitest';
import { alignProse } from '../../../../packages/client/src/components/cells/proseAlignment.ts';

const source =
  '# The question\n\nA **lager** is held [warm](https://a.example/lager) at =[run.species.D, last] for $k_s$ days.';
const shown = 'The question\nA lager is held warm at 12.1 µM for  days.';
const at = alignProse(source, shown);

/** The word of the typeset prose that stands where a word of the source begins. */
const wordAt = (word: string) => /^[\p{L}\p{N}]+/u.exec(shown.slice(at(source.indexOf(word))))?.[0];

test.each(['question', 'lager', 'held', 'warm', 'for', 'days'])('%s stands where it is shown', (word) => {
  expect(wordAt(word)).toBe(word);
});

test('a place within a word stands within it', () => {
  expect(at(source.indexOf('lager') + 3)).toBe(shown.indexOf('lager') + 3);
});

test('a place in an address or a value stands before the next word that is shown', () => {
  const place = at(source.indexOf('species'));
  expect(place).toBeGreaterThanOrEqual(shown.indexOf('at') + 2);
  expect(place).toBeLessThanOrEqual(shown.indexOf('for'));
});

test('places keep their order', () => {
  const places = Array.from(source, (_, i) => at(i));
  expect(places).toEqual([...places].sort((a, b) => a - b));
});
