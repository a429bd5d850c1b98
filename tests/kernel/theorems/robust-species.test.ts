import { describe, expect, test } from 'vitest';
import { expectSilence, failing, judge } from '../../support/verdicts.ts';

const id = 'robust-species';

describe('robust concentrations', () => {
  test('two-component network with ATP as cofactor: phosphorylated response regulator (Shinar, Feinberg 2010)', () => {
    const verdict = judge(
      id,
      'XD <=> X; X <=> XT; XT -> Xp; Xp + Y <=> XpY; XpY -> X + Yp; XT + Yp <=> XTYp; XTYp -> XT + Y',
    );
    expect(verdict.applies).toBe('yes');
    expect(verdict.hypotheses.at(-1)?.text).toBe(
      'XT and XT + Yp lie outside the terminal strong classes and differ only in Yp.',
    );
    expect(verdict.conclusion).toContain('Yp has the same concentration');
  });

  test('the value for given constants: A + B -> 2 B, B -> A gives A = k2/k1', () => {
    const verdict = judge(id, 'A + B -> 2 B; B -> A', { constants: [3, '7/2'] });
    expect(verdict.conclusion).toContain('For the constants given: A = 7/6, in every positive steady state');
  });

  test('a pair that differs by two molecules has a root as its value: 0 -> A, 2 A -> 0, 2 k2 A^2 = k1', () => {
    expect(judge(id, '0 -> A; 2 A -> 0', { constants: [1, 2] }).conclusion).toContain('A = (1/4)^(1/2)');
  });

  test('open networks can be robust too: A + B -> 2 B, B -> 0, 0 -> A', () => {
    const verdict = judge(id, 'A + B -> 2 B; B -> 0; 0 -> A', { constants: [2, 3, 5] });
    expect(verdict.conclusion).toContain('A = 3/2, B = 5/3');
  });

  test('constants without positive steady state are recognised: A -> 0, A -> 2 A -> 0 with k1 > k2', () => {
    // Deficiency 1; A and 2 A are non-terminal and differ in A. A = (k2 - k1)/(2 k3) where that is positive.
    expect(judge(id, 'A -> 0; A -> 2 A; 2 A -> 0', { constants: [1, 3, 4] }).conclusion).toContain('A = 1/4');
    expect(judge(id, 'A -> 0; A -> 2 A; 2 A -> 0', { constants: [3, 1, 4] }).conclusion).toContain(
      'admit no positive steady state',
    );
  });

  test('"no" for the reversible Schlögl network does not say that a concentration varies', () => {
    const verdict = judge(id, '0 <=> X; 2 X <=> 3 X');
    expectSilence(verdict, /concentration (varies|is not robust)/);
    expect(failing(verdict)).toEqual([
      'Two complexes outside the terminal strong classes differ in one species only.',
    ]);
  });
});
