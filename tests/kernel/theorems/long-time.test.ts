import { describe, expect, test } from 'vitest';
import { expectSilence, judge } from '../../support/verdicts.ts';

describe('one-dimensional networks', () => {
  const id = 'one-dimensional';

  test('Schlögl’s network has 3, 1 or 2 positive steady states, counted exactly (Schlögl 1972)', () => {
    const count = (constants: (number | string)[]): string =>
      judge(id, '0 <=> X; 2 X <=> 3 X', { constants, start: { X: 1 } }).conclusion;
    expect(count([6, 11, 6, 1])).toContain('exactly 3 positive');
    expect(count([1, 11, 6, 1])).toContain('exactly one positive');
    // (x − 1)^2 (x − 2): a double zero counts once.
    expect(count([2, 5, 4, 1])).toContain('exactly 2 positive');
  });

  test('states on the edge of the class are not positive: A + B -> 2 B, B -> A below its threshold', () => {
    expect(
      judge(id, 'A + B -> 2 B; B -> A', { constants: [1, 5], start: { A: 2, B: 1 } }).conclusion,
    ).toContain('no positive steady state');
    expect(
      judge(id, 'A + B -> 2 B; B -> A', { constants: [1, 1], start: { A: 2, B: 1 } }).conclusion,
    ).toContain('exactly one positive');
  });

  test('balanced birth and death leaves every state steady', () => {
    expect(judge(id, 'X -> 2 X; X -> 0', { constants: [1, 1], start: { X: 3 } }).conclusion).toContain(
      'every state of the class is steady',
    );
  });

  test('needs no values for the statement on oscillation', () => {
    expect(judge(id, '0 <=> X; 2 X <=> 3 X')).toMatchObject({ applies: 'yes', scope: 'all constants' });
  });

  test('"no" for rank 2 does not claim oscillation', () => {
    expectSilence(judge(id, 'A <=> B; B <=> C'), /(?<!follow that )solutions oscillate/);
  });
});

describe('counts in the long run', () => {
  test('a linear function for all constants: 0 -> A, 2 A -> 0', () => {
    expect(judge('non-explosive', '0 -> A; 2 A -> 0')).toMatchObject({
      applies: 'yes',
      case: 'linear function',
      scope: 'all constants',
    });
    expect(judge('positive-recurrent', '0 -> A; 2 A -> 0').applies).toBe('yes');
  });

  test('birth and death: recurrent exactly for the constants with k2 > k1', () => {
    expect(judge('positive-recurrent', '0 -> X; X -> 2 X; X -> 0', { constants: [1, 1, 2] })).toMatchObject({
      applies: 'yes',
      scope: 'these constants',
    });
    expect(judge('positive-recurrent', '0 -> X; X -> 2 X; X -> 0', { constants: [1, 2, 1] }).applies).toBe(
      'undecided',
    );
    expect(judge('non-explosive', '0 -> X; X -> 2 X; X -> 0').applies).toBe('yes');
  });

  test('2 X -> 3 X explodes: undecided, never "yes"', () => {
    expect(judge('non-explosive', '2 X -> 3 X').applies).toBe('undecided');
    expect(judge('non-explosive', '2 X -> 3 X').conclusion).toContain(
      'does not follow that the counts explode',
    );
  });

  test('complex balance excludes explosion where no linear function does (Anderson, Cappelletti, Koyama, Kurtz 2018)', () => {
    const verdict = judge('non-explosive', '0 <=> X; 2 X <=> 3 X', { constants: [1, 1, 1, 1] });
    expect(verdict).toMatchObject({ applies: 'yes', case: 'complex balance' });
  });

  test('conservative networks have finite classes', () => {
    expect(judge('positive-recurrent', 'E + S <=> ES; ES -> E + P').applies).toBe('yes');
  });

  test('fractional coefficients have no counts: "no" claims nothing', () => {
    expectSilence(judge('non-explosive', 'A -> 1/2 B'), /(?<!need not )explodes?\b/);
    expectSilence(judge('positive-recurrent', 'A -> 1/2 B'), /there is no stationary/);
  });
});
