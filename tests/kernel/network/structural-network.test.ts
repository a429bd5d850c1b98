import { describe, expect, test } from 'vitest';
import type { StructuralNetwork } from '@stillroom/kernel/network';
import {
  complexLabel,
  oneArrowOfEachPair,
  stoichiometry,
  structuralNetwork,
  structuralNetworkAsWritten,
} from '@stillroom/kernel/network';
import { buildNetwork } from '../../support/network.ts';

const labels = (network: StructuralNetwork): string[] =>
  Array.from({ length: network.complexes.count }, (_, y) =>
    complexLabel(network.species, network.complexes, y),
  );

const arrows = (network: StructuralNetwork): string[] => {
  const names = labels(network);
  return Array.from(
    { length: network.arrows.count },
    (_, arrow) => `${names[network.arrows.from[arrow]!]} -> ${names[network.arrows.to[arrow]!]}`,
  );
};

const columns = (network: StructuralNetwork): Record<string, number>[] => {
  const { matrix } = stoichiometry(network);
  return Array.from({ length: matrix.columnCount }, (_, j) => {
    const column: Record<string, number> = {};
    for (let k = matrix.offsets[j]!; k < matrix.offsets[j + 1]!; k++) {
      column[network.species[matrix.rows[k]!]!] = matrix.values[k]!;
    }
    return column;
  });
};

describe('the structural network', () => {
  test('states equal rows once and keeps every written reaction', () => {
    const network = structuralNetwork(buildNetwork('A + B -> C; C -> A; B + A -> C; C -> A + B'));
    expect(arrows(network)).toEqual(['A + B -> C', 'C -> A', 'C -> A + B']);
    expect([...network.reactions.arrow]).toEqual([0, 1, 0, 2]);
    expect([...network.arrows.reaction]).toEqual([0, 1, 3]);
    expect([...network.arrows.reverse]).toEqual([2, -1, 0]);
    expect(network.reduced).toBe(false);
  });

  test('pairs opposite arrows however they were written', () => {
    const network = structuralNetwork(buildNetwork('A <=> B; B <=> A; B -> C'));
    expect(arrows(network)).toEqual(['A -> B', 'B -> A', 'B -> C']);
    expect([...network.arrows.reverse]).toEqual([1, 0, -1]);
    expect([...oneArrowOfEachPair(network)]).toEqual([0, 2]);
  });

  test('strikes fixed species out, merges what became equal, drops what changes nothing', () => {
    const text = 'A + X -> 2 X; X -> 2 X; X + A <=> X; X -> 0; A -> 0';
    const network = structuralNetwork(buildNetwork(text, { fixed: { A: 1 } }));
    expect(network.species).toEqual(['X']);
    expect(labels(network)).toEqual(['X', '2 X', '0']);
    expect(arrows(network)).toEqual(['X -> 2 X', 'X -> 0']);
    expect([...network.reactions.arrow]).toEqual([0, 0, 1]);
    expect([...network.reactions.source]).toEqual([0, 1, 4]);
    expect(network.reduced).toBe(true);
    expect(network.warnings).toHaveLength(3);
    expect(network.warnings[0]).toContain('A + X -> X');
    expect(network.warnings[2]).toMatch(/^Line 5: .*A -> 0/);
    expect(structuralNetworkAsWritten(buildNetwork(text, { fixed: { A: 1 } })).species).toEqual(['A', 'X']);
  });

  test('has exact columns, cancelled coefficients left out, fractions scaled', () => {
    expect(columns(structuralNetwork(buildNetwork('A + E -> B + E; 2 A -> 0; 0 -> 1000000 B')))).toEqual([
      { A: -1, B: 1 },
      { A: -2 },
      { B: 1000000 },
    ]);
    const fractions = structuralNetwork(buildNetwork('1/2 A + 1/3 B -> C'));
    expect(columns(fractions)).toEqual([{ A: -3, B: -2, C: 6 }]);
    expect([...stoichiometry(fractions).scale!]).toEqual([6]);
    expect(labels(fractions)).toEqual(['1/2 A + 1/3 B', 'C']);
  });

  test('refuses fractions that have no common denominator below 2^53, in words', () => {
    const text = '1/94906267 A + 1/94906265 B -> C';
    expect(() => stoichiometry(structuralNetwork(buildNetwork(text)))).toThrow(/common denominator/);
  });

  test('is defined for nothing at all and for the zero complex', () => {
    const empty = structuralNetwork(buildNetwork(''));
    expect([empty.species.length, empty.complexes.count, empty.arrows.count]).toEqual([0, 0, 0]);
    expect(labels(structuralNetwork(buildNetwork('0 -> A')))).toEqual(['0', 'A']);
    const gone = structuralNetwork(buildNetwork('A -> B', { fixed: { A: 1, B: 1 } }));
    expect([gone.species.length, gone.complexes.count, gone.arrows.count]).toEqual([0, 0, 0]);
  });
});
