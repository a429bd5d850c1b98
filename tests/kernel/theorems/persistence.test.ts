import { describe, expect, test } from 'vitest';
import { expectSilence, judge } from '../../support/verdicts.ts';

const id = 'persistence';

describe('persistence', () => {
  test('the enzyme mechanism without loss is persistent (Angeli, De Leenheer, Sontag 2007)', () => {
    const verdict = judge(id, 'E + S <=> ES; ES -> E + P; P + F <=> PF; PF -> F + S');
    expect(verdict.applies).toBe('yes');
    expect(verdict.hypotheses.filter(({ claim }) => claim === 'siphon holds a law').length).toBeGreaterThan(
      0,
    );
  });

  test('a critical siphon: "no" for 2 A <=> A + B, in which nevertheless no species dies out (Anderson 2011)', () => {
    const verdict = judge(id, '2 A <=> A + B');
    expectSilence(verdict, /(?<!not follow that any )species (dies|die) out|becomes extinct/);
    expect(verdict.hypotheses.at(-1)?.witness).toEqual({ kind: 'set', species: ['A'] });
  });

  test('not conservative: the hypothesis fails, with a flux that only produces', () => {
    const verdict = judge(id, '0 <=> A');
    expectSilence(verdict, /(?<!not follow that any )species dies out/);
    expect(verdict.hypotheses[1]).toMatchObject({
      claim: 'conservative',
      holds: false,
      witness: { of: 'fluxes' },
    });
  });
});

describe('no steady state on the boundary', () => {
  test('needs no conservation: 0 <=> A has no siphon at all', () => {
    expect(judge('no-boundary-steady-state', '0 <=> A').applies).toBe('yes');
  });

  test('"no" does not claim that such a state exists', () => {
    expectSilence(
      judge('no-boundary-steady-state', '2 A <=> A + B'),
      /there is a steady state|(?<!nor that any )species dies out/,
    );
  });
});
