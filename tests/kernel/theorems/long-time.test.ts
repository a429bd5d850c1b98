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

  test('a complex that raises the function may be outgrown: X -> 2 X + 2 Z by 2 X -> 0 in the Oregonator (derived)', () => {
    const text = 'Y -> X; X + Y -> 0; X -> 2 X + 2 Z; 2 X -> 0; Z -> Y';
    expect(judge('positive-recurrent', text)).toMatchObject({ applies: 'yes', scope: 'all constants' });
    // Without 2 X -> 0 nothing holds X back.
    expect(judge('positive-recurrent', text.replace('2 X -> 0; ', '')).applies).toBe('undecided');
  });

  test('a gene that laws bound needs no drift of its own: G0 <=> G1, G1 -> G1 + P, P -> 0 (Gupta, Briat, Khammash 2014)', () => {
    const text = 'G0 <=> G1; G1 -> G1 + P; P -> 0';
    const verdict = judge('positive-recurrent', text);
    expect(verdict).toMatchObject({ applies: 'yes', case: 'linear function', scope: 'all constants' });
    expect(judge('positive-recurrent', text.replace('; P -> 0', '')).applies).toBe('undecided');
  });

  test('M -> M + P is repaid by M -> 0 at a weight that depends on the constants: gene, messenger, protein (Gupta, Briat, Khammash 2014)', () => {
    const text = 'G0 <=> G1; G1 -> G1 + M; M -> 0; M -> M + P; P -> 0';
    const verdict = judge('positive-recurrent', text);
    expect(verdict).toMatchObject({ applies: 'yes', scope: 'all constants' });
    expect(verdict.hypotheses.filter(({ claim }) => claim === 'inward drift')).toHaveLength(2);
    // A protein that makes messengers in turn closes a loop, and constants decide.
    expect(judge('positive-recurrent', `${text}; P -> P + M`).applies).toBe('undecided');
  });

  test('birth and death: recurrent exactly for the constants with k2 > k1', () => {
    expect(judge('positive-recurrent', '0 -> X; X -> 2 X; X -> 0', { constants: [1, 1, 2] })).toMatchObject({
      applies: 'yes',
      scope: 'these constants',
    });
    const { applies, conclusion } = judge('positive-recurrent', '0 -> X; X -> 2 X; X -> 0', {
      constants: [1, 2, 1],
    });
    expect(applies).toBe('no');
    expect(conclusion).toContain('transient');
    expect(judge('positive-recurrent', '0 -> X; X -> 2 X; X -> 0').applies).toBe('undecided');
    expect(judge('non-explosive', '0 -> X; X -> 2 X; X -> 0').applies).toBe('yes');
  });

  test('2 X -> 3 X explodes, whatever its constant (pure birth at a quadratic rate; Xu, Hansen, Wiuf 2022)', () => {
    const verdict = judge('non-explosive', '2 X -> 3 X');
    expect(verdict).toMatchObject({ applies: 'no', scope: 'all constants' });
    expect(verdict.conclusion).toContain('infinitely many reactions occur in finite time');
    expect(judge('non-explosive', 'X -> 2 X').applies).toBe('yes');
  });

  test('undecided where two species may raise each other: A + B -> 2 A + B, A + B -> A + 2 B', () => {
    const verdict = judge('non-explosive', 'A + B -> 2 A + B; A + B -> A + 2 B');
    expect(verdict.applies).toBe('undecided');
    expect(verdict.conclusion).toContain('does not follow that the counts explode');
  });

  test('complex balance excludes explosion where no linear function does (Anderson, Cappelletti, Koyama, Kurtz 2018)', () => {
    const verdict = judge('non-explosive', '0 <=> X; 2 X <=> 3 X', { constants: [1, 1, 1, 1] });
    expect(verdict).toMatchObject({ applies: 'yes', case: 'complex balance' });
  });

  test('complex balance gives a stationary law on every class (Anderson, Craciun, Kurtz 2010)', () => {
    expect(
      judge('positive-recurrent', '0 <=> A; A <=> B; A + B <=> 2 A', { constants: [1, 1, 1, 1, 1, 1] }),
    ).toMatchObject({ applies: 'yes', case: 'complex balance' });
  });

  // 3 X -> 4 X and 3 X -> 2 X at rate 1 cancel in the mean (α = 0, ϑ = 1); 2 X -> 4 X at rate k adds γ = 2 k, so β = 2 k − 1.
  test.each([
    ['1/4', 'yes', 'yes'],
    ['1/2', 'yes', 'yes'],
    [1, 'no', 'no'],
  ])(
    'on a line the second terms decide where the first cancel: k = %s (Xu, Hansen, Wiuf 2022)',
    (k, explosion, recurrence) => {
      const options = { constants: [1, 1, k, 1] };
      const text = '3 X -> 4 X; 3 X -> 2 X; 2 X -> 4 X; 0 -> X';
      expect(judge('non-explosive', text, options).applies).toBe(explosion);
      expect(judge('positive-recurrent', text, options).applies).toBe(recurrence);
    },
  );

  test('R = 2 and α = β = 0 is null recurrent, R = 1 and α = 0 as well (Xu, Hansen, Wiuf 2022)', () => {
    // 2 X -> 3 X and 2 X -> X at rate 1: ϑ = 1; X -> 2 X at rate 1: γ = 1.
    const balanced = judge('positive-recurrent', '2 X -> 3 X; 2 X -> X; X -> 2 X; 0 -> X', {
      constants: [1, 1, 1, 1],
    });
    expect(balanced.applies).toBe('no');
    expect(balanced.conclusion).toContain('null recurrent');
    const critical = judge('positive-recurrent', 'X -> 2 X; X -> 0; 0 -> X', { constants: [1, 1, 1] });
    expect(critical.conclusion).toContain('null recurrent');
  });

  test('Schlögl’s network is positive recurrent for all constants, the highest reaction lowering X', () => {
    for (const id of ['non-explosive', 'positive-recurrent'] as const)
      expect(judge(id, '0 <=> X; 2 X <=> 3 X')).toMatchObject({ applies: 'yes', scope: 'all constants' });
    expect(judge('one-dimensional', '0 <=> X; 2 X <=> 3 X').conclusion).toContain('positive recurrent');
  });

  test('a catalyst that stands still counts by the start: E + X -> E + 2 X against X -> 0', () => {
    const text = 'E + X -> E + 2 X; X -> 0; 0 -> X';
    const at = (E: number): string =>
      judge('positive-recurrent', text, { constants: [1, 3, 1], start: { E, X: 1 } }).applies;
    expect([at(2), at(3), at(4)]).toEqual(['yes', 'no', 'no']);
    expect(judge('positive-recurrent', text, { constants: [1, 3, 1] }).applies).toBe('undecided');
  });

  test('conservative networks have finite classes', () => {
    expect(judge('positive-recurrent', 'E + S <=> ES; ES -> E + P').applies).toBe('yes');
  });

  test('fractional coefficients have no counts: "no" claims nothing', () => {
    expectSilence(judge('non-explosive', 'A -> 1/2 B'), /(?<!need not )explodes?\b/);
    expectSilence(judge('positive-recurrent', 'A -> 1/2 B'), /there is no stationary/);
  });
});
