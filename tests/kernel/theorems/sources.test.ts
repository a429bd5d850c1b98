import { theorems } from '@stillroom/kernel/theorems';
import type { Citation } from '@stillroom/shared/cells';
import { describe, expect, test } from 'vitest';
import { sources } from '../../../packages/kernel/src/theorems/sources.ts';

const all: readonly (readonly [string, Citation])[] = Object.entries(sources);
const cited = new Set<Citation>(theorems.flatMap(({ citation }) => citation));

describe('publications', () => {
  test('every theorem cites from the one list, each work once, and every work is cited', () => {
    const known = new Set<Citation>(all.map(([, source]) => source));
    for (const { id, citation } of theorems) {
      expect(new Set(citation).size, id).toBe(citation.length);
      for (const source of citation) expect(known.has(source), id).toBe(true);
    }
    expect(all.filter(([, source]) => !cited.has(source)).map(([name]) => name)).toEqual([]);
  });

  test.each(all)('%s can be found: a well-formed doi, or journal, volume and pages', (_, source) => {
    if (source.doi === undefined) expect(source.where).toMatch(/^\p{Lu}.* \d+, L?\d+–L?\d+$/u);
    else expect(source.doi).toMatch(/^10\.\d{4,5}\/[\w.()/-]*\w$/);
  });

  test.each(all)('%s has initials, names, a title and the year of its key', (name, source) => {
    for (const author of source.authors.split(', '))
      expect(author).toMatch(/^(?:\p{Lu}\.[ -]?)+ ?(?:De )?\p{Lu}[\p{L}’-]+$/u);
    expect(source.title).toMatch(/^\p{Lu}.*[\p{L}\d?]$/u);
    expect(name).toContain(String(source.year));
    expect(source.year).toBeGreaterThanOrEqual(1800);
    expect(source.year).toBeLessThanOrEqual(2026);
  });

  test('no doi stands for two works', () => {
    const numbers = all.flatMap(([, { doi }]) => doi?.toLowerCase() ?? []);
    expect(new Set(numbers).size).toBe(numbers.length);
  });
});
