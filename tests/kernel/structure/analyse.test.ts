import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import { leftNullspace, matrixFrom, rankOf } from '@stillroom/kernel/exact';
import { structuralNetwork } from '@stillroom/kernel/network';
import { analyse } from '@stillroom/kernel/structure';
import { buildNetwork } from '../../support/network.ts';
import { slowStructure } from '../../support/slow-structure.ts';
import { structureWords } from '../../support/structure-words.ts';

const seed = 20261201;
const names = ['A', 'B', 'C', 'D', 'F', 'G'];

/** "2 A + B" or "1/2 A" over the first species of the list. */
const sides = (species: number, coefficients: readonly string[]) =>
  fc
    .uniqueArray(fc.tuple(fc.nat(species - 1), fc.constantFrom(...coefficients)), {
      selector: ([i]) => i,
      maxLength: 2,
    })
    .map((terms) => terms.map(([i, coefficient]) => `${coefficient} ${names[i]}`).join(' + ') || '0');

/** Compares sides whatever the order of their terms. */
const sorted = (side: string) => side.split(' + ').sort().join(' + ');

const networks = (coefficients: readonly string[]) =>
  fc.integer({ min: 2, max: 6 }).chain((species) =>
    fc
      .array(
        fc
          .tuple(sides(species, coefficients), fc.constantFrom('->', '<=>'), sides(species, coefficients))
          .filter(([from, , to]) => sorted(from) !== sorted(to)),
        { minLength: 1, maxLength: 5 },
      )
      .map((rows) => rows.map((row) => row.join(' '))),
  );

function expectAgreement(text: string): void {
  const network = buildNetwork(text);
  const slow = slowStructure(network);
  const words = structureWords(network);
  expect({
    complexes: words.complexes.length,
    arrows: words.arrows.length,
    linkageClasses: words.linkageClasses.length,
    strongClasses: words.strongClasses.length,
    terminalClasses: words.terminalClasses.length,
    rank: words.rank,
    deficiency: words.deficiency,
    classRanks: words.classRanks,
    reversible: words.reversible,
    weaklyReversible: words.weaklyReversible,
    extremeLaws: words.extremeLaws,
    conservative: words.conservative,
    consistent: words.consistent,
    minimalSiphons: words.minimalSiphons,
    criticalSiphons: words.criticalSiphons,
  }).toEqual({
    complexes: slow.complexes.length,
    arrows: slow.arrows.length,
    linkageClasses: slow.linkageClasses,
    strongClasses: slow.strongClasses,
    terminalClasses: slow.terminalClasses,
    rank: slow.rank,
    deficiency: slow.complexes.length - slow.linkageClasses - slow.rank,
    classRanks: slow.classRanks,
    reversible: slow.reversible,
    weaklyReversible: slow.strongClasses === slow.linkageClasses,
    extremeLaws: slow.extremeLaws,
    conservative: slow.conservative,
    consistent: slow.consistent,
    minimalSiphons: slow.minimalSiphons,
    criticalSiphons: slow.criticalSiphons,
  });
}

describe('the structure of random networks', () => {
  test('agrees with the definitions spelt out over fractions', () => {
    fc.assert(
      fc.property(networks(['1', '1', '2', '3']), (rows) => expectAgreement(rows.join('; '))),
      { seed, numRuns: 400 },
    );
  });

  test('agrees with rational coefficients', () => {
    fc.assert(
      fc.property(networks(['1', '1/2', '2/3', '5/7']), (rows) => expectAgreement(rows.join('; '))),
      { seed, numRuns: 150 },
    );
  });

  test('does not depend on the order of rows, the sides of sums, or the names of species', () => {
    const shuffled = networks(['1', '2']).chain((rows) =>
      fc.tuple(fc.constant(rows), fc.shuffledSubarray(rows, { minLength: rows.length }), fc.nat(5)),
    );
    fc.assert(
      fc.property(shuffled, ([rows, other, shift]) => {
        const renamed = (name: string) => names[(names.indexOf(name) + shift) % names.length]!;
        const moved = other.map((row) =>
          row
            .replace(/[A-G]/g, renamed)
            .split(/ (<=>|->) /)
            .map((part) => part.split(' + ').reverse().join(' + '))
            .join(' '),
        );
        expect(structureWords(buildNetwork(moved.join('; ')))).toEqual(
          structureWords(buildNetwork(rows.join('; ')), renamed),
        );
      }),
      { seed, numRuns: 200 },
    );
  });

  test('the deficiency is the dimension of ker Y ∩ im I_a', () => {
    fc.assert(
      fc.property(networks(['1', '2']), (rows) => {
        const network = structuralNetwork(buildNetwork(rows.join('; ')));
        const { complexes, arrows, species } = network;
        // dim(ker Y ∩ im I_a) = rank I_a − rank(Y I_a).
        const incidence = matrixFrom(complexes.count, arrows.count, (y, arrow) =>
          BigInt(Number(arrows.to[arrow] === y) - Number(arrows.from[arrow] === y)),
        );
        const content = (i: number, y: number) => {
          for (let k = complexes.offsets[y]!; k < complexes.offsets[y + 1]!; k++) {
            if (complexes.species[k] === i) return BigInt(complexes.numerators[k]!);
          }
          return 0n;
        };
        const changes = matrixFrom(
          species.length,
          arrows.count,
          (i, arrow) => content(i, arrows.to[arrow]!) - content(i, arrows.from[arrow]!),
        );
        const structure = analyse(network);
        expect(structure.deficiency).toBe(rankOf(incidence) - rankOf(changes));
        expect(structure.laws?.basis).toHaveLength(leftNullspace(changes).length);
        const classes = structure.classes.reduce((sum, { deficiency }) => sum + deficiency!, 0);
        expect(classes).toBeLessThanOrEqual(structure.deficiency!);
      }),
      { seed, numRuns: 200 },
    );
  });
});
