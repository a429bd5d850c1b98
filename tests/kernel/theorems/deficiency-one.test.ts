import { describe, expect, test } from 'vitest';
import { expectSilence, failing, judge } from '../../support/verdicts.ts';

const id = 'deficiency-one';

describe('deficiency one theorem', () => {
  test('weakly reversible: the triangle of Horn and Jackson (1972) has exactly one for all constants', () => {
    const verdict = judge(id, '2 A -> A + B; A + B -> 2 B; 2 B -> 2 A');
    expect(verdict).toMatchObject({ applies: 'yes', case: 'weakly reversible' });
    expect(verdict.conclusion).toMatch(/^For all constants every positive class has exactly one/);
  });

  test('A -> 0, A -> 2 A -> 0: existence depends on the constants (k2 > k1), and the verdict says so', () => {
    const verdict = judge(id, 'A -> 0; A -> 2 A; 2 A -> 0');
    expect(verdict).toMatchObject({ applies: 'yes', case: 'not weakly reversible' });
    expect(verdict.conclusion).toContain('may depend on the constants');
    expect(verdict.silentOn).toContain('stability');
  });

  test('each hypothesis fails alone', () => {
    // Deficiencies 0 + 0 + 0, whole 1 (Lotka 1920).
    expect(failing(judge(id, 'A -> 2 A; A + B -> 2 B; B -> 0'))).toEqual([
      'The deficiencies of the linkage classes add up to the deficiency of the network.',
    ]);
    // One class of deficiency 2 (Horn, Jackson 1972).
    expect(failing(judge(id, '3 A -> A + 2 B; A + 2 B -> 3 B; 3 B -> 2 A + B; 2 A + B -> 3 A'))).toEqual([
      'No linkage class has a deficiency above 1.',
    ]);
    // X -> 0 and X -> 2 X: two terminal classes.
    const split = judge(id, 'X -> 2 X; X -> 0');
    expect(failing(split)).toEqual(['Every linkage class has exactly one terminal strong class.']);
    expect(split.hypotheses.at(-1)?.witness).toEqual({ kind: 'set', complexes: [1, 2] });
  });

  test('"no" for Lotka’s network says nothing: it has exactly one positive steady state', () => {
    expectSilence(judge(id, 'A -> 2 A; A + B -> 2 B; B -> 0'), /several|no positive/);
  });
});
