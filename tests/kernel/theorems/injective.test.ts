import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { contextOf } from '@stillroom/kernel/theorems';
import { minorProducts } from '../../../packages/kernel/src/theorems/minors/minor-products.ts';
import { monomolecularUniqueness } from '../../../packages/kernel/src/theorems/monomolecular-uniqueness.ts';
import { searchPattern } from '../../../packages/kernel/src/theorems/signs/sign-search.ts';
import { buildNetwork } from '../../support/network.ts';
import { expectSilence, judge } from '../../support/verdicts.ts';

const id = 'injective';
const oneSite = 'S0+E<=>ES0; ES0->S1+E; S1+F<=>FS1; FS1->S0+F';
const twoSites = `${oneSite}; S1+E<=>ES1; ES1->S2+E; S2+F<=>FS2; FS2->S1+F`;

/** Positive and negative products, by number. */
function tally(text: string): number[] {
  const products = minorProducts(contextOf(buildNetwork(text)), 1_000_000);
  return products === null ? [] : [products.positive, products.negative].sort((a, b) => b - a);
}

describe('determinant criterion', () => {
  test('one-site cycle: 8 products of one sign; two-site cycle: 41 against 9 (theory-methods, by script)', () => {
    expect(tally(oneSite)).toEqual([8, 0]);
    expect(tally(twoSites)).toEqual([41, 9]);
    expect(judge(id, oneSite).applies).toBe('yes');
  });

  test('A + B -> P, B + C -> Q, C -> 2 A with flow: 36 against 1 (Craciun, Feinberg 2005, table 1)', () => {
    const flow = '0 <=> A; 0 <=> B; 0 <=> C; P -> 0; Q -> 0';
    expect(tally(`A + B <=> P; B + C <=> Q; C <=> 2 A; ${flow}`)).toEqual([36, 1]);
    expect(judge(id, `A + B <=> P; B + C <=> Q; C <=> 2 A; ${flow}`).applies).toBe('no');
  });

  test('one step longer: 138 against 0 (Craciun, Feinberg 2005, table 1)', () => {
    const flow = '0 <=> A; 0 <=> B; 0 <=> C; 0 <=> D; P -> 0; Q -> 0; R -> 0';
    expect(tally(`A + B <=> P; B + C <=> Q; C + D <=> R; D <=> 2 A; ${flow}`)).toEqual([138, 0]);
  });

  test('"no" does not mean several: 0 <=> A, 0 <=> B, A + B <=> 2 A has exactly one (theory-methods)', () => {
    const verdict = judge(id, '0 <=> A; 0 <=> B; A + B <=> 2 A');
    expectSilence(verdict, /(?<!follow that there are )several positive steady states/);
    expect(verdict.hypotheses[1]?.witness).toMatchObject({ kind: 'minors', pairs: [{}, {}] });
  });

  test('the sign patterns agree with the minors wherever both are decided', () => {
    for (const text of [
      oneSite,
      twoSites,
      '0 <=> A; 0 <=> B; A + B <=> 2 A',
      'A -> 2 A; A + B -> 2 B; B -> 0',
      '0 <=> X; 2 X <=> 3 X',
      'A + B <=> C; 2 A <=> C',
      '0 -> A; 2 A -> 0',
    ]) {
      const context = contextOf(buildNetwork(text));
      const search = searchPattern(context, 'mass action');
      const products = minorProducts(context, 1_000_000)!;
      const oneSigned =
        products.positive + products.negative > 0 && (products.positive === 0 || products.negative === 0);
      expect(`${text}: ${search.kind}`).toBe(`${text}: ${oneSigned ? 'none' : 'found'}`);
    }
  });

  test('undecided beyond the size limit, and it says so', () => {
    const ring = Array.from(
      { length: 600 },
      (_, i) => `X${i} + X${(i + 1) % 600} <=> X${(i + 2) % 600}`,
    ).join('; ');
    const verdict = contextOf(buildNetwork(ring)).verdict(id);
    expect(verdict.applies).toBe('undecided');
    expect(verdict.hypotheses[1]?.text).toContain('too large');
  });

  test('monomolecular networks of any size are decided by their terminal classes, as minors and sign patterns say', () => {
    const ring = Array.from({ length: 600 }, (_, i) => `X${i} <=> X${(i + 1) % 600}`).join('; ');
    expect(contextOf(buildNetwork(ring)).verdict(id).applies).toBe('yes');
    const end = fc.constantFrom('0', 'A', 'B', 'C', 'D');
    const rows = fc
      .array(fc.tuple(end, fc.constantFrom('->', '<=>'), end), { minLength: 1, maxLength: 6 })
      .map((list) => list.filter(([from, , to]) => from !== to).map((row) => row.join(' ')))
      .filter((list) => list.length > 0);
    fc.assert(
      fc.property(rows, (list) => {
        const context = contextOf(buildNetwork(list.join('; ')));
        const products = minorProducts(context, 1_000_000)!;
        const oneSigned =
          products.positive + products.negative > 0 && (products.positive === 0 || products.negative === 0);
        expect(monomolecularUniqueness(context)).toBe(oneSigned);
        expect(searchPattern(context, 'weakly monotonic').kind).toBe(oneSigned ? 'none' : 'found');
      }),
      { seed: 11, numRuns: 150 },
    );
  });
});
