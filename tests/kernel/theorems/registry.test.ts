import { readdirSync } from 'node:fs';
import { verdictIds } from '@stillroom/shared/cells';
import { theorems } from '@stillroom/kernel/theorems';
import { expect, test } from 'vitest';

test('every verdict has its theorem, listed once, in a file of its name, with title, statement and source', () => {
  expect(theorems.map(({ id }) => id).sort()).toEqual([...verdictIds].sort());
  const files = readdirSync(new URL('../../../packages/kernel/src/theorems/', import.meta.url));
  for (const { id, title, statement, citation } of theorems) {
    expect(files).toContain(`${id}.ts`);
    expect(title.length).toBeGreaterThan(3);
    expect(statement).toMatch(/\.$/);
    expect(citation.length).toBeGreaterThan(0);
    for (const { authors, year, title: work } of citation) {
      expect(authors).not.toBe('');
      expect(work).not.toBe('');
      expect(year).toBeGreaterThan(1800);
    }
  }
});
