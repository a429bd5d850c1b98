import { describe, expect, test } from 'vitest';
import { arrowKey, canLight, lightOf, lightWords } from '../../../packages/client/src/graph/lit.ts';
import { citationText } from '../../../packages/client/src/components/results/witness.ts';
import type { StructureResult } from '../../../packages/client/src/components/results/shapes.ts';

/** E + S <=> ES -> E + P, and P -> S, in rows R1 (three arrows) and R2. */
const structure = {
  species: ['E', 'S', 'ES', 'P'],
  complexes: [
    { of: { E: 1, S: 1 } },
    { of: { ES: 1 } },
    { of: { E: 1, P: 1 } },
    { of: { P: 1 } },
    { of: { S: 1 } },
  ],
  reactions: [
    { row: 0, from: 0, to: 1, reverse: 1 },
    { row: 0, from: 1, to: 0, reverse: 0 },
    { row: 0, from: 1, to: 2, reverse: null },
    { row: 1, from: 3, to: 4, reverse: null },
  ],
} as unknown as StructureResult;

describe('what a witness lights', () => {
  test('an arrow: itself, its ends and its row', () => {
    const light = lightOf({ kind: 'arrow', reaction: 3 }, structure);
    expect([...light.arrows.keys()]).toEqual([arrowKey(3, 4)]);
    expect([...light.complexes]).toEqual([3, 4]);
    expect([...light.rows]).toEqual([1]);
    expect(light.species.size).toBe(0);
  });

  test('an arrow that is not there: nothing', () => {
    const light = lightOf({ kind: 'arrow', reaction: 99 }, structure);
    expect([light.arrows.size, light.complexes.size, light.rows.size]).toEqual([0, 0, 0]);
  });

  test('a set of species: them, and the complexes and rows that hold them', () => {
    const light = lightOf({ kind: 'set', species: ['ES'] }, structure);
    expect([...light.species.keys()]).toEqual(['ES']);
    expect([...light.complexes]).toEqual([1]);
    expect([...light.rows]).toEqual([0]);
  });

  test('a set of complexes: exactly those', () => {
    expect([...lightOf({ kind: 'set', complexes: [0, 3] }, structure).complexes]).toEqual([0, 3]);
  });

  test('a flux: each arrow with its coefficient', () => {
    const light = lightOf({ kind: 'vector', of: 'fluxes', entries: { 0: '3/2', 3: -1 } }, structure);
    expect([...light.reactions]).toEqual([
      [0, '3/2'],
      [3, '−1'],
    ]);
    expect(light.arrows.get(arrowKey(0, 1))).toBe('3/2');
    expect(light.arrows.has(arrowKey(1, 0))).toBe(false);
    expect([...light.rows]).toEqual([0, 1]);
  });

  test('a law: each species with its coefficient', () => {
    const light = lightOf({ kind: 'vector', of: 'laws', entries: { E: 1, ES: 2 } }, structure);
    expect([...light.species]).toEqual([
      ['E', '1'],
      ['ES', '2'],
    ]);
  });

  test('two numbers have no place in a picture', () => {
    expect(canLight({ kind: 'number', left: 1, right: 0 })).toBe(false);
    expect(canLight({ kind: 'arrow', reaction: 0 })).toBe(true);
  });

  test('is told in words, with rows as the page numbers them', () => {
    const words = lightWords('P → S', lightOf({ kind: 'arrow', reaction: 3 }, structure));
    expect(words).toBe('Lit: P → S; 1 arrow, in row R2. Escape puts it out.');
  });
});

test('a citation names authors once, with all their years', () => {
  expect(
    citationText([
      { authors: 'M. Feinberg', year: 1987, title: 'Chemical reaction network structure' },
      { authors: 'F. Horn, R. Jackson', year: 1972, title: 'General mass action kinetics' },
      { authors: 'M. Feinberg', year: 1995, title: 'The existence and uniqueness of steady states' },
    ]),
  ).toBe('Feinberg 1987, 1995; Horn, Jackson 1972');
});

test('many authors are cut after three, and a family name of two words stays whole', () => {
  const cite = (authors: string) => citationText([{ authors, year: 2007, title: 'On persistence' }]);
  expect(cite('D. Angeli, P. De Leenheer, E. D. Sontag')).toBe('Angeli, De Leenheer, Sontag 2007');
  expect(cite('S. Müller, E. Feliu, G. Regensburger, C. Conradi, A. Shiu')).toBe(
    'Müller, Feliu, Regensburger and others 2007',
  );
});
