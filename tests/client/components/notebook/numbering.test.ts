import { describe, expect, test } from 'vitest';
import { headingOf, numberCells } from '../../../../packages/client/src/components/notebook/numbering.ts';

test('schemes, structures, figures and claims are numbered each in its own series, in document order', () => {
  const numbers = numberCells([
    { id: 'a', kind: 'network' },
    { id: 'b', kind: 'prose' },
    { id: 'c', kind: 'trajectory' },
    { id: 'd', kind: 'plot' },
    { id: 'e', kind: 'network' },
    { id: 'f', kind: 'claim' },
    { id: 'g', kind: 'script' },
  ]);
  expect(Object.fromEntries(numbers)).toEqual({
    a: 'Scheme 1',
    c: 'Figure 1',
    d: 'Figure 2',
    e: 'Scheme 2',
    f: 'Claim 1',
  });
});

describe('what prose is called', () => {
  test('by its first heading, without its signs', () =>
    expect(headingOf('Words.\n\n## The *question* ##\n')).toBe('The question'));
  test('by its first words where it has none', () =>
    expect(headingOf('\n\nA lager is held warm at the end of fermentation.')).toBe(
      'A lager is held warm at the end of fer…',
    ));
  test('empty prose says so', () => expect(headingOf(' \n ')).toBe('Empty prose'));
});
