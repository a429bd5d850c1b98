import { describe, expect, test } from 'vitest';
import type { Verdict } from '@stillroom/shared/cells';
import { deficiencyOneAlgorithm } from '../../../packages/kernel/src/theorems/deficiency-one-algorithm/decide.ts';
import { contextOf } from '@stillroom/kernel/theorems';
import { buildNetwork } from '../../support/network.ts';
import { referenceNetwork, referenceNetworks } from '../../support/reference-networks.ts';
import { judge, verdictOn } from '../../support/verdicts.ts';

const id = 'several-steady-states';

/** Midpoints of the boxes of one species, ascending. */
function values(verdict: Verdict, species: string): number[] {
  const witness = verdict.hypotheses.find(({ claim }) => claim === 'several states verified')?.witness;
  if (witness?.kind !== 'states') throw new Error('no states');
  return witness.boxes.map((box) => (box[species]![0] + box[species]![1]) / 2).sort((a, b) => a - b);
}

describe('deficiency one algorithm', () => {
  const outcome = (text: string): string => deficiencyOneAlgorithm(contextOf(buildNetwork(text))).kind;

  test.each([
    'A <=> 2 A; A + B <=> C; C <=> B',
    '0 <=> X; 2 X <=> 3 X',
    'A <=> B; 2 A + B <=> 3 A',
    '0 <=> A; 0 <=> B; 2 A + B <=> 3 A',
  ])('several for %s (Feinberg 1988, 1995; theory-methods, by script)', (text) =>
    expect(outcome(text)).toBe('several'),
  );

  test.each([
    '0 -> X; X -> Y; 2 X + Y -> 3 X; X -> 0',
    '0 <=> A; A -> B; 2 A + B -> 3 A',
    'A <=> 2 A; A + B <=> 2 B; B <=> 0',
    'S0+E<=>ES0;ES0->S1+E;S1+F<=>FS1;FS1->S0+F',
    'A + B -> 2 B; B -> A',
  ])('at most one for %s (the same sources)', (text) => expect(outcome(text)).toBe('at most one'));

  test('does not apply to the reversible triangle, which is not regular', () => {
    expect(outcome('2 A <=> A + B; A + B <=> 2 B; 2 B <=> 2 A')).toBe('inapplicable');
  });
});

describe('several positive steady states', () => {
  test('Edelstein’s network with the published constants: A = 1/2 between 0.0907823024535474 and 6.60921769754645', () => {
    const verdict = judge(id, 'A <=> 2 A; A + B <=> C; C <=> B', {
      constants: ['17/2', 1, 1, '1/5', 1, '1/10'],
      start: { A: 1, B: 15 },
    });
    expect(verdict).toMatchObject({ applies: 'yes', scope: 'these constants and start' });
    const [low, middle, high] = values(verdict, 'A');
    expect(low).toBeCloseTo(0.0907823024535474, 10);
    expect(middle).toBeCloseTo(0.5, 12);
    expect(high).toBeCloseTo(6.60921769754645, 9);
  });

  test('Schlögl’s network has three for suitable constants: 0 <=> X, 2 X <=> 3 X at 1, 2 and 3 (x^3 − 6 x^2 + 11 x − 6)', () => {
    const verdict = judge(id, '0 <=> X; 2 X <=> 3 X', { constants: [6, 11, 6, 1], start: { X: 1 } });
    expect(verdict.applies).toBe('yes');
    expect(values(verdict, 'X').map((value) => Math.round(value * 1e9) / 1e9)).toEqual([1, 2, 3]);
  });

  test('the square of Horn and Jackson: 3 − √3, 3, 3 + √3 for ε = 1/10 and total 6', () => {
    const verdict = judge(id, '3 A -> A + 2 B; A + 2 B -> 3 B; 3 B -> 2 A + B; 2 A + B -> 3 A', {
      constants: ['1/10', 1, '1/10', 1],
      start: { A: 6 },
    });
    const found = values(verdict, 'A');
    expect(found).toHaveLength(3);
    [3 - Math.sqrt(3), 3, 3 + Math.sqrt(3)].forEach((value, i) => expect(found[i]).toBeCloseTo(value, 10));
  });

  test('dual phosphorylation has a verified pair for some constants (Markevich, Hoek, Kholodenko 2004)', () => {
    const verdict = judge(
      id,
      'S0+E<=>ES0;ES0->S1+E;S1+F<=>FS1;FS1->S0+F;S1+E<=>ES1;ES1->S2+E;S2+F<=>FS2;FS2->S1+F',
    );
    expect(verdict).toMatchObject({ applies: 'yes', scope: 'all constants' });
    expect(values(verdict, 'S0').length).toBeGreaterThanOrEqual(2);
  });

  test('"no" comes with a proof, by whichever theorem', () => {
    expect(judge(id, 'A -> 2 A; A + B -> 2 B; B -> 0').hypotheses[0]?.text).toContain(
      'deficiency one algorithm',
    );
    expect(judge(id, 'S0+E<=>ES0;ES0->S1+E;S1+F<=>FS1;FS1->S0+F').hypotheses[0]?.text).toContain(
      'one-to-one',
    );
    expect(judge(id, '2 A -> A + B; A + B -> 2 B; 2 B -> 2 A').hypotheses[0]?.text).toContain(
      'deficiency one theorem',
    );
  });

  test('the Oregonator has one for all constants: permanent (Gopalkrishnan, Miller, Shiu 2014), and of one sign (Conradi et al. 2017)', () => {
    // By hand: eliminating Z and Y leaves 3 k1 k3 − (k2 k3 + 2 k1 k4) x − 2 k2 k4 x² = 0, with one positive root.
    const verdict = judge(id, 'Y->X; X+Y->0; X->2X+2Z; 2X->0; Z->Y');
    expect(verdict).toMatchObject({ applies: 'no', case: 'degree criterion', scope: 'all constants' });
  });

  test('the shuttle model of the Wnt pathway has several (MacLean, Rosen, Byrne, Harrington 2015)', () => {
    const entry = referenceNetworks.find((network) => network.id === 'wnt_shuttle')!;
    const verdict = verdictOn(referenceNetwork(entry), id);
    expect(verdict).toMatchObject({ applies: 'yes', scope: 'all constants' });
  });

  test('on a line zeros that are all crossed downwards cannot be two: A -> 3 A, A <=> 2 A, 3 A -> A, A -> 0 (derived)', () => {
    expect(judge(id, 'A -> 3 A; A <=> 2 A; 3 A -> A; A -> 0')).toMatchObject({
      applies: 'no',
      case: 'degree criterion',
    });
  });

  test('a continuum of degenerate states is undecided, with the reason: X -> 2 X, X -> 0 at equal constants', () => {
    const verdict = judge(id, 'X -> 2 X; X -> 0');
    expect(verdict.applies).toBe('undecided');
    expect(verdict.conclusion).toContain('degenerate');
  });

  test('a search that meets nothing is undecided, not "no"', () => {
    const verdict = judge(id, 'A + B -> 2 B; B -> A; A + C -> 2 C; C -> A; B + C -> 2 A');
    expect(verdict.applies).toBe('undecided');
  });
});

describe('at most one positive steady state', () => {
  test('gathers the proof and names it', () => {
    expect(judge('at-most-one', 'E + S <=> ES; ES <=> E + P')).toMatchObject({
      applies: 'yes',
      case: 'deficiency-zero',
    });
    expect(judge('at-most-one', 'A + B -> 2 B; B -> A')).toMatchObject({
      applies: 'yes',
      case: 'deficiency one algorithm',
    });
  });

  test('"no" rests on two verified states', () => {
    expect(judge('at-most-one', '0 <=> X; 2 X <=> 3 X').conclusion).toContain(
      'at least two positive steady states',
    );
  });
});
