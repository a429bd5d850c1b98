import type { VerdictId } from '@stillroom/shared/cells';
import { describe, expect, test } from 'vitest';
import { buildNetwork } from '../../support/network.ts';
import { expectSilence, judge, verdictOn } from '../../support/verdicts.ts';

/** The verdict on a network whose first arrow has a constant rate in place of mass action. */
function judgeOtherLaw(id: VerdictId, text: string) {
  const plain = buildNetwork(text, { constants: [1, 1] });
  const law = { expression: { kind: 'number', value: 1 }, net: false, massAction: null } as const;
  const laws = Int32Array.from({ length: plain.reactions.count }, (_, i) => (i === 0 ? 0 : -1));
  return verdictOn({ ...plain, laws: [law], reactions: { ...plain.reactions, law: laws } }, id);
}

describe('complex balance', () => {
  const id = 'complex-balance';
  const triangle = '2 A -> A + B; A + B -> 2 B; 2 B -> 2 A';

  test('k2^2 = k1*k3 for the triangle (Horn, Jackson 1972; Craciun et al. 2009)', () => {
    const yes = judge(id, triangle, { constants: [1, 2, 4] });
    expect(yes).toMatchObject({ applies: 'yes', scope: 'these constants' });
    expect(yes.hypotheses.at(-1)).toMatchObject({
      text: 'k2^2 = k1*k3.',
      witness: { left: '4', right: '4' },
    });
    const no = judge(id, triangle, { constants: [1, 1, 4] });
    expectSilence(no, /several|no positive steady state|unstable/);
    expect(no.hypotheses.at(-1)).toMatchObject({ holds: false, witness: { left: '1', right: '4' } });
  });

  test('deficiency zero needs no values', () => {
    expect(judge(id, 'A <=> B')).toMatchObject({ applies: 'yes', scope: 'all constants' });
  });

  test('a law that is not mass action: the constants are not said to be out of balance', () => {
    expectSilence(judgeOtherLaw(id, 'A <=> B'), /not complex balanced/);
  });

  test('a law that leads to another compartment is an amount per time, so the constants are not compared', () => {
    const plain = buildNetwork(triangle, { constants: [1, 2, 4] });
    const volume = { value: 1, exact: { numerator: 1n, denominator: 1n } };
    const compartments = [
      { name: 'V', volume, unit: null, species: [] },
      { name: 'W', volume, unit: null, species: [1] },
    ];
    const verdict = verdictOn({ ...plain, compartments }, id);
    expect(verdict.applies).toBe('undecided');
    expect(verdict.conclusion).toContain('from one compartment to another');
  });

  test('undecided while values are missing, and it names one', () => {
    const verdict = judge(id, triangle, { constants: [1, 2] });
    expect(verdict.applies).toBe('undecided');
    expect(verdict.conclusion).toBe('Needs values: k3 has no value.');
  });
});

describe('detailed balance', () => {
  const id = 'detailed-balance';
  const triangle = '2 A <=> A + B; A + B <=> 2 B; 2 B <=> 2 A';

  test('the circuit alone is not enough (Feinberg 1989): 2·3·1 = 1·1·6 closes, 2 = 3 fails', () => {
    const verdict = judge(id, triangle, { constants: [2, 1, 3, 1, 1, 6] });
    expectSilence(verdict, /several|unstable/);
    expect(verdict.hypotheses.slice(2).map(({ holds }) => holds)).toEqual([true, false]);
  });

  test('both conditions hold for (2, 1; 2, 1; 1, 4)', () => {
    expect(judge(id, triangle, { constants: [2, 1, 2, 1, 1, 4] }).applies).toBe('yes');
  });

  test('complex balanced without detailed balance: A <=> B <=> C <=> A with a turning flux', () => {
    const text = 'A <=> B; B <=> C; C <=> A';
    const constants = [2, 1, 2, 1, 2, 1];
    expect(judge(id, text, { constants }).applies).toBe('no');
    expect(judge('complex-balance', text, { constants }).applies).toBe('yes');
  });

  test('a law that is not mass action: the constants are not said to be out of balance', () => {
    expectSilence(judgeOtherLaw(id, 'A <=> B'), /not detailed balanced/);
  });

  test('an arrow without reverse: "no" for all constants', () => {
    expect(judge(id, 'A -> B; B -> C; C -> A')).toMatchObject({ applies: 'no', scope: 'all constants' });
  });
});

describe('global stability', () => {
  const id = 'global-stability';

  test('one linkage class (Anderson 2011): 2 A <=> A + B, in spite of its critical siphon', () => {
    expect(judge(id, '2 A <=> A + B')).toMatchObject({ applies: 'yes', case: 'one linkage class' });
  });

  test('rank at most 3, or no critical siphon', () => {
    expect(judge(id, 'A <=> 2 B; C <=> D')).toMatchObject({ applies: 'yes', case: 'rank at most 3' });
    expect(judge(id, 'A <=> B; C <=> D; E <=> F; G <=> H')).toMatchObject({
      applies: 'yes',
      case: 'no critical siphon',
    });
  });

  test('undecided where no published case applies', () => {
    // Two linkage classes, rank 4, and the critical siphon {A}.
    const verdict = judge(id, '2 A <=> A + B; C <=> D; E <=> F; G <=> H');
    expect(verdict.applies).toBe('undecided');
    expect(verdict.conclusion).toContain('not relied on');
  });

  test('"no" claims nothing', () => {
    expectSilence(judge(id, 'A -> 2 A; A + B -> 2 B; B -> 0'), /unstable|does not tend/);
  });
});
