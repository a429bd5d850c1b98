import { describe, expect, test } from 'vitest';
import { openingOf } from '../../../../packages/server/src/modules/notebooks/index.ts';
import { cell } from '../../../support/cells.ts';

const opening = (...texts: string[]) =>
  openingOf({
    cells: texts.map((text, place) => cell(`c${place}`, 'prose', text)),
  });

describe('the opening of a notebook', () => {
  test('is the first words of the first prose that has any, without headings and marks', () => {
    expect(opening('# Title\n\nDoes *clearance* `stall`?')).toBe('Does clearance stall?');
    expect(opening('# Only a heading', 'Then words')).toBe('Then words');
    expect(opening()).toBe('');
  });

  test('shows mathematics, links and woven values as they can be read without being set', () => {
    expect(opening('A site of $n$ beads sends one on at rate $\\theta(n) = 1 + b/n$.')).toBe(
      'A site of n beads sends one on at rate θ(n) = 1 + b/n.',
    );
    expect(opening('With $k_{on} \\le 2$:\n\n$$\n\\dot x = f(x)\n$$\n\nit stays.')).toBe(
      'With kon ≤ 2: … it stays.',
    );
    expect(opening('See [the assay](https://example.org): =[run1.species.P, last] of rest_20.')).toBe(
      'See the assay: … of rest_20.',
    );
  });

  test('is cut at a word', () => {
    const cut = opening('word '.repeat(100));
    expect(cut.length).toBeLessThanOrEqual(161);
    expect(cut).toMatch(/word…$/u);
  });

  test('is found in one go in a long text of brackets that nothing closes', () => {
    expect(opening(`Words ${'=['.repeat(1_000_000)}`)).toMatch(/^Words =\[=\[/u);
  });
});
