import { checkWitness, contextOf } from '@stillroom/kernel/theorems';
import { describe, expect, test } from 'vitest';
import { endotacticity } from '../../../packages/kernel/src/theorems/endotactic/strongly-endotactic.ts';
import { buildNetwork } from '../../support/network.ts';
import { expectSilence, judge } from '../../support/verdicts.ts';

const id = 'global-stability';

/** Four segments that cross in one point, each multiplied by all species: strongly endotactic, all siphons critical. */
const crossing =
  'A+2B+2C+2D <=> 3A+2B+2C+2D; 2A+B+2C+2D <=> 2A+3B+2C+2D; 2A+2B+C+2D <=> 2A+2B+3C+2D; 2A+2B+2C+D <=> 2A+2B+2C+3D';

describe('strongly endotactic networks (Gopalkrishnan, Miller, Shiu 2014)', () => {
  const kind = (text: string): string => endotacticity(contextOf(buildNetwork(text))).kind;

  test('weakly reversible with one linkage class: yes (their corollary)', () => {
    expect(kind('A <=> B; B <=> C')).toBe('yes');
    expect(kind('2 A -> A + B; A + B -> 2 B; 2 B -> 2 A')).toBe('yes');
  });

  test('two separate reversible reactions are endotactic, but not strongly: along A + B the pair C, D moves', () => {
    expect(kind('A <=> B; C <=> D')).toBe('no');
    expect(kind(crossing)).toBe('yes');
  });

  test('one species: the outermost reactants must point inwards', () => {
    expect(kind('0 <=> X; 2 X <=> 3 X')).toBe('yes');
    expect(kind('X -> 2 X; 2 X -> X')).toBe('yes');
    expect(kind('X -> 2 X; X -> 0')).toBe('no');
    expect(kind('0 -> X; 2 X -> 3 X')).toBe('no');
  });

  test('Lotka and Volterra’s network is not, Oregonator is (by hand: every direction has a reaction inwards)', () => {
    expect(kind('A -> 2 A; A + B -> 2 B; B -> 0')).toBe('no');
    expect(kind('Y -> X; X + Y -> 0; X -> 2 X + 2 Z; 2 X -> 0; Z -> Y')).toBe('yes');
  });

  test('against directions on a fine grid, in the plane', () => {
    const networks = [
      'A -> A + B; 2 A + B -> A; B -> 2 B; 2 B -> A + B',
      '0 -> A; 0 -> B; 2 A -> A; A + 2 B -> A + B',
      '0 -> A + B; A + B -> 0; 2 A -> 2 A + B; 2 B -> 2 B + A',
      'A -> B; B -> A; 2 A + B -> 3 A; 3 A -> 2 A + B',
      '0 -> A; A -> B; B -> 0',
      '0 -> 2 A; 2 A -> 2 B; 2 B -> 0; A -> A + B',
    ];
    for (const text of networks) expect([text, kind(text)]).toEqual([text, onGrid(text) ? 'yes' : 'no']);
  });
});

/** All directions (p, q) with small whole p and q: enough for networks whose coefficients are at most 3. */
function onGrid(text: string): boolean {
  const rows = text.split(';').map((row) => row.split('->').map(vector));
  for (let p = -12; p <= 12; p++) {
    for (let q = -12; q <= 12; q++) {
      const along = ([a, b]: readonly [number, number]): number => p * a + q * b;
      const gains = rows.map(([from, to]) => along(to!) - along(from!));
      if (gains.every((gain) => gain === 0)) continue;
      const top = Math.max(...rows.map(([from]) => along(from!)));
      const outer = gains.filter((_, k) => along(rows[k]![0]!) === top);
      if (outer.some((gain) => gain > 0) || outer.every((gain) => gain === 0)) return false;
    }
  }
  return true;
}

function vector(side: string): [number, number] {
  const amount = (name: string): number =>
    side
      .split('+')
      .map((term) => new RegExp(`^\\s*(\\d*)\\s*${name}\\s*$`).exec(term))
      .reduce((sum, found) => sum + (found === null ? 0 : Number(found[1] === '' ? 1 : found[1])), 0);
  return [amount('A'), amount('B')];
}

describe('global stability', () => {
  test('one linkage class (Anderson 2011)', () => {
    expect(judge(id, 'A + B <=> 2 B')).toMatchObject({ applies: 'yes', case: 'one linkage class' });
  });

  test('rank at most 3 (Pantea 2012; Craciun, Nazarov, Pantea 2013), although {B} and {D} are critical', () => {
    expect(judge(id, 'A + B <=> 2 B; C + D <=> 2 D')).toMatchObject({
      applies: 'yes',
      case: 'rank at most 3',
    });
  });

  test('no critical siphon (Angeli, De Leenheer, Sontag 2007; Anderson 2008): four isomerisations', () => {
    expect(judge(id, 'A <=> B; C <=> D; E <=> F; G <=> H')).toMatchObject({
      applies: 'yes',
      case: 'no critical siphon',
    });
  });

  test('strongly endotactic (Gopalkrishnan, Miller, Shiu 2014): rank 4, four linkage classes, {A} critical', () => {
    const verdict = judge(id, crossing);
    expect(verdict).toMatchObject({ applies: 'yes', case: 'strongly endotactic', scope: 'all constants' });
    const network = buildNetwork('A + B <=> 2 B; C + D <=> 2 D; E + F <=> 2 F; G + H <=> 2 H');
    expect(checkWitness(network, verdict).ok).toBe(false);
  });

  test('undecided where no published case covers it: four pairs A + B <=> 2 B', () => {
    const verdict = judge(id, 'A + B <=> 2 B; C + D <=> 2 D; E + F <=> 2 F; G + H <=> 2 H');
    expect(verdict.applies).toBe('undecided');
    expect(verdict.conclusion).toContain('announced in 2015');
    expect(verdict.hypotheses.at(-1)!.text).toContain('not strongly endotactic');
  });

  test('not complex balanced: "no" claims nothing about where solutions go', () => {
    expectSilence(judge(id, 'A -> 2 A; A + B -> 2 B; B -> 0'), /unstable|tend to infinity/);
  });
});
