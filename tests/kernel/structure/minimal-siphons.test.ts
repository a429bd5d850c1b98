import { describe, expect, test } from 'vitest';
import { structuralNetwork } from '@stillroom/kernel/network';
import { conservationLaws, judgeSiphons, minimalSiphons } from '@stillroom/kernel/structure';
import { buildNetwork } from '../../support/network.ts';

const of = (text: string, limits?: { siphons: number; steps: number }) => {
  const network = structuralNetwork(buildNetwork(text));
  const { siphons, complete } = minimalSiphons(network, undefined, limits);
  return {
    network,
    siphons,
    complete,
    names: siphons.map((set) => Array.from(set, (i) => network.species[i])),
  };
};

/** n independent choices: every one doubles the number of minimal siphons through T. */
const doubling = (n: number) =>
  Array.from({ length: n }, (_, i) => `A${i} + B${i} -> T + A${i} + B${i}; T -> A${i}; T -> B${i}`).join(
    '; ',
  );

describe('minimal siphons', () => {
  test('of the one-site futile cycle', () => {
    // Angeli, De Leenheer, Sontag 2007, example of a futile cycle: three minimal siphons, each a conservation law.
    const { names } = of('E + S <=> C; C -> E + P; F + P <=> D; D -> F + S');
    expect(names).toEqual([
      ['E', 'C'],
      ['S', 'C', 'P', 'D'],
      ['F', 'D'],
    ]);
  });

  test('a species fed from nothing is in none', () => {
    expect(of('0 -> A; A -> B; B -> C; C -> B').names).toEqual([]);
    expect(of('A -> B; 0 -> C').names).toEqual([['A']]);
  });

  test('their number may double with every row, and the search ends at its limits', () => {
    const all = of(doubling(6));
    expect(all.complete).toBe(true);
    expect(all.siphons).toHaveLength(2 ** 6);
    const few = of(doubling(6), { siphons: 10, steps: 1e9 });
    expect(few.complete).toBe(false);
    expect(few.siphons).toHaveLength(10);
    expect(of(doubling(12), { siphons: 1e9, steps: 20_000 }).complete).toBe(false);
    expect(of(doubling(6), { siphons: 64, steps: 1e9 }).complete).toBe(true);
  });

  test('are critical exactly when no law lies in them, with or without the list of laws', () => {
    for (const text of ['A + B <=> C; C -> A + D', 'S + I -> 2 I; I -> R', '2 A <=> B; B + C -> A']) {
      const { network, siphons } = of(text);
      const laws = conservationLaws(network)!;
      const byLaws = judgeSiphons(network, siphons, laws);
      const byProgrammes = judgeSiphons(network, siphons, {
        ...laws,
        nonnegative: [],
        nonnegativeComplete: false,
      });
      expect(byProgrammes.map(({ critical }) => critical)).toEqual(byLaws.map(({ critical }) => critical));
      for (const { species, law } of byProgrammes) {
        if (law === null) continue;
        expect([...law.indices].every((i) => species.includes(i))).toBe(true);
        expect(law.values.every((value) => value > 0n)).toBe(true);
      }
    }
  });
});
