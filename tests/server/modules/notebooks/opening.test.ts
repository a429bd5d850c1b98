import { describe, expect, test } from 'vitest';
import { openingOf } from '../../../../packages/server/src/modules/notebooks/index.ts';
import { cell } from '../../../support/cells.ts';

const opening = (...texts: string[]) =>
  openingOf({
    title: '',
    subject: 'none',
    cells: texts.map((text, place) => cell(`c${place}`, 'prose', text)),
  });

describe('the opening of a notebook', () => {
  test('is the first words of the first prose that has any, without headings and marks', () => {
    expect(opening('# Title\n\nDoes *clearance* `stall`?')).toBe('Does clearance stall?');
    expect(opening('# Only a heading', 'Then words')).toBe('Then words');
    expect(opening()).toBe('');
  });

  test('is cut at a word', () => {
    const cut = opening('word '.repeat(100));
    expect(cut.length).toBeLessThanOrEqual(161);
    expect(cut).toMatch(/word…$/u);
  });
});
