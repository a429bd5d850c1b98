import { describe, expect, test } from 'vitest';
import { contextOf } from '@stillroom/kernel/theorems';
import { buildNetwork } from '../../support/network.ts';
import { expectSilence, judge, verdictOn } from '../../support/verdicts.ts';

const id = 'concordant';

describe('concordance', () => {
  test('A + B <=> P, B + C <=> Q, C <=> A with flow, every species degraded, is concordant (odd and even cycles of Shinar, Feinberg 2012)', () => {
    expect(
      judge(id, 'A + B <=> P; B + C <=> Q; C <=> A; 0 <=> A; 0 <=> B; 0 <=> C; P -> 0; Q -> 0').applies,
    ).toBe('yes');
  });

  test('A + B <=> P, B + C <=> Q, C <=> 2 A with flow is discordant (Shinar, Feinberg 2012); "no" claims nothing', () => {
    const verdict = judge(
      id,
      'A + B <=> P; B + C <=> Q; C <=> 2 A; 0 <=> A; 0 <=> B; 0 <=> C; P -> 0; Q -> 0',
    );
    expectSilence(verdict, /(?<!follow that there are )several positive steady states/);
    expect(verdict.hypotheses.map(({ witness }) => witness?.kind)).toEqual([undefined, 'vector', 'vector']);
  });

  test('speaks for laws that are not mass action: a saturating degradation', () => {
    const plain = buildNetwork('0 -> X; X -> 0');
    const name = (text: string) => ({ kind: 'name', name: text }) as const;
    const saturating = {
      kind: 'binary',
      operator: '/',
      left: name('X'),
      right: { kind: 'binary', operator: '+', left: name('K'), right: name('X') },
    } as const;
    const withLaw = (
      expression:
        | typeof saturating
        | {
            kind: 'call';
            name: 'min';
            arguments: readonly [ReturnType<typeof name>, ReturnType<typeof name>];
          },
    ) => ({
      ...plain,
      laws: [{ expression, net: false, massAction: null }],
      reactions: { ...plain.reactions, law: Int32Array.from([-1, 0]) },
    });
    expect(verdictOn(withLaw(saturating), id).applies).toBe('yes');
    // min(X, K) does not rise beyond K, so the hypothesis is left open.
    expect(
      verdictOn(withLaw({ kind: 'call', name: 'min', arguments: [name('X'), name('K')] }), id).applies,
    ).toBe('undecided');
  });

  test('a concordant network is injective for mass action (Shinar, Feinberg 2012)', () => {
    for (const text of [
      'E + S <=> ES; ES -> E + P',
      '0 -> X; X -> Y; 2 X + Y -> 3 X; X -> 0',
      'S + I -> 2 I; I -> R',
    ]) {
      const context = contextOf(buildNetwork(text));
      expect([context.verdict(id).applies, context.verdict('injective').applies]).toEqual(['yes', 'yes']);
    }
  });
});
