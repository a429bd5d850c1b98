import { describe, expect, test } from 'vitest';
import { expectSilence, judge } from '../../support/verdicts.ts';

describe('existence of a positive steady state', () => {
  test('a weakly reversible network of deficiency 2 has one for all constants (Boros 2019)', () => {
    const verdict = judge('existence', '3 A -> A + 2 B; A + 2 B -> 3 B; 3 B -> 2 A + B; 2 A + B -> 3 A');
    expect(verdict.applies).toBe('yes');
    expect(verdict.conclusion).toContain('at least one');
  });

  test('"no" does not deny existence: Lotka’s network has a positive steady state', () => {
    const verdict = judge('existence', 'A -> 2 A; A + B -> 2 B; B -> 0');
    expectSilence(verdict, /no positive steady state/);
    expect(verdict.hypotheses[1]?.witness).toEqual({ kind: 'arrow', reaction: 0 });
  });
});

describe('no positive steady state', () => {
  const id = 'no-positive-steady-state';

  test('an infection that only runs forward is not consistent (Kermack, McKendrick 1927)', () => {
    const verdict = judge(id, 'S + I -> 2 I; I -> R');
    expect(verdict.applies).toBe('yes');
    expect(verdict.conclusion).toContain('no positive steady state');
  });

  test('"no" does not claim that one exists: A -> 0, A -> 2 A has none unless the constants are equal', () => {
    expectSilence(judge(id, 'A -> 0; A -> 2 A'), /there is a positive|has a positive|exactly one/);
  });
});
