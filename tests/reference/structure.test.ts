import { describe, expect, test } from 'vitest';
import type { SparseVector } from '@stillroom/kernel/exact';
import { matrixOfRows, rankOf } from '@stillroom/kernel/exact';
import { complexLabel, structuralNetwork } from '@stillroom/kernel/network';
import type { Structure } from '@stillroom/kernel/structure';
import { analyse, membersOf } from '@stillroom/kernel/structure';
import type { ReferenceNetwork } from '../support/reference-networks.ts';
import { referenceNetwork, referenceNetworks } from '../support/reference-networks.ts';

/*
 * tests/reference/structure.json: networks of the literature with their structural numbers, computed in exact arithmetic
 * by a program outside this project; the file says which were also compared with print.
 */

const bySpecies = (structure: Structure, { indices, values }: SparseVector): Record<string, number> =>
  Object.fromEntries(
    Array.from(indices, (species, i) => [structure.network.species[species]!, Number(values[i])]),
  );

const labels = (structure: Structure, complexes: Int32Array): string[] =>
  Array.from(complexes, (complex) =>
    complexLabel(structure.network.species, structure.network.complexes, complex),
  );

const asSets = (sets: readonly (readonly string[])[]) => sets.map((set) => [...set].sort().join(', ')).sort();

const asLaws = (laws: readonly Readonly<Record<string, number>>[]) =>
  laws.map((law) => JSON.stringify(Object.entries(law).sort(([a], [b]) => (a < b ? -1 : 1)))).sort();

function rowsOf(species: readonly string[], laws: readonly Readonly<Record<string, number>>[]): bigint[][] {
  return laws.map((law) => species.map((name) => BigInt(law[name] ?? 0)));
}

describe.each(referenceNetworks.map((entry): [string, ReferenceNetwork] => [entry.id, entry]))(
  '%s',
  (_, entry) => {
    const { oracle } = entry;
    const structure = analyse(structuralNetwork(referenceNetwork(entry)));
    const { network } = structure;

    test('lists species, complexes and arrows in order of appearance', () => {
      expect(network.species).toEqual(oracle.species);
      const names = labels(
        structure,
        Int32Array.from({ length: network.complexes.count }, (_x, i) => i),
      );
      expect(names).toEqual(oracle.complexes);
      const arrows = Array.from({ length: network.arrows.count }, (_x, arrow) => [
        names[network.arrows.from[arrow]!],
        names[network.arrows.to[arrow]!],
      ]);
      expect(arrows).toEqual(oracle.reactions);
    });

    test('counts', () => {
      const { counts } = oracle;
      expect({
        species: network.species.length,
        n: network.complexes.count,
        reactions: network.arrows.count,
        linkage_classes: structure.linkage.count,
        strong_linkage_classes: structure.strong.count,
        terminal_strong_linkage_classes: structure.terminalCount,
        rank: structure.rank,
        deficiency: structure.deficiency,
        conservation_laws: structure.laws?.basis.length,
      }).toEqual({
        species: counts.species,
        n: counts.n,
        reactions: counts.reactions,
        linkage_classes: counts.linkage_classes,
        strong_linkage_classes: counts.strong_linkage_classes,
        terminal_strong_linkage_classes: counts.terminal_strong_linkage_classes,
        rank: counts.rank,
        deficiency: counts.deficiency,
        conservation_laws: counts.conservation_laws,
      });
      expect(structure.reversible).toBe(oracle.reversible);
      expect(structure.weaklyReversible).toBe(oracle.weakly_reversible);
    });

    test('classes', () => {
      const classes = structure.classes.map((numbers, group) => ({
        complexes: labels(structure, membersOf(structure.linkage, group)),
        n: numbers.complexes,
        rank: numbers.rank,
        deficiency: numbers.deficiency,
        terminal_classes: numbers.terminalStrongClasses,
      }));
      expect(classes).toEqual(
        oracle.linkage_classes.map(({ complexes, n, rank, deficiency, terminal_classes }) => ({
          complexes,
          n,
          rank,
          deficiency,
          terminal_classes,
        })),
      );
      const terminal = Array.from({ length: structure.strong.count }, (_x, group) => group)
        .filter((group) => structure.terminal[group] === 1)
        .map((group) => labels(structure, membersOf(structure.strong, group)));
      expect(asSets(terminal)).toEqual(asSets(oracle.terminal_strong_classes));
    });

    test('conservation laws', () => {
      const laws = structure.laws!;
      expect(laws.complete && laws.nonnegativeComplete).toBe(true);
      const extreme = laws.nonnegative.map((law) => bySpecies(structure, law));
      expect(asLaws(extreme)).toEqual(asLaws(oracle.extreme_nonnegative_laws));
      const own = rowsOf(
        oracle.species,
        laws.basis.map((law) => bySpecies(structure, law)),
      );
      const theirs = rowsOf(oracle.species, oracle.conservation_basis);
      expect(rankOf(matrixOfRows(own, oracle.species.length))).toBe(theirs.length);
      expect(rankOf(matrixOfRows([...own, ...theirs], oracle.species.length))).toBe(theirs.length);
    });

    test('conservative and consistent', () => {
      expect(structure.conservative.holds).toBe(oracle.conservative);
      expect(structure.consistent).toBe(oracle.consistent);
    });

    test.skipIf(oracle.minimal_siphons === null)('minimal siphons', () => {
      const names = (species: Int32Array) => Array.from(species, (i) => network.species[i]!);
      expect(structure.siphons.complete).toBe(true);
      const siphons = structure.siphons.siphons;
      expect(asSets(siphons.map(({ species }) => names(species)))).toEqual(asSets(oracle.minimal_siphons!));
      const critical = siphons.filter((siphon) => siphon.critical).map(({ species }) => names(species));
      expect(asSets(critical)).toEqual(asSets(oracle.critical_minimal_siphons!));
    });
  },
);
