import { contextOf, theorems } from '@stillroom/kernel/theorems';
import { describe, expect, test } from 'vitest';
import { buildNetwork } from '../../support/network.ts';
import { expectSilence, failing, judge, verdictOn } from '../../support/verdicts.ts';

const id = 'deficiency-zero';

describe('deficiency zero theorem', () => {
  test('weakly reversible: E + S <=> ES <=> E + P (Feinberg 1987)', () => {
    const verdict = judge(id, 'E + S <=> ES; ES <=> E + P');
    expect(verdict).toMatchObject({ applies: 'yes', case: 'weakly reversible', scope: 'all constants' });
    expect(verdict.conclusion).toContain('exactly one positive steady state');
  });

  test('not weakly reversible: E + S <=> ES -> E + P has no positive steady state (Feinberg 1987)', () => {
    const verdict = judge(id, 'E + S <=> ES; ES -> E + P');
    expect(verdict).toMatchObject({ applies: 'yes', case: 'not weakly reversible' });
    expect(verdict.conclusion).toContain('no positive steady state');
    expect(verdict.silentOn).toContain('zero');
  });

  test('"no" for 2 A -> A + B -> 2 B -> 2 A (deficiency 1) says nothing about steady states: there is exactly one', () => {
    const verdict = judge(id, '2 A -> A + B; A + B -> 2 B; 2 B -> 2 A');
    expectSilence(verdict, /no positive steady state|several|unstable/);
    expect(failing(verdict)).toEqual(['The deficiency is 0.']);
  });

  test('a law that is not mass action leaves case (b) without its hypothesis', () => {
    const plain = buildNetwork('A <=> B');
    const law = { expression: { kind: 'number', value: 1 }, net: false, massAction: null } as const;
    const network = {
      ...plain,
      laws: [law],
      reactions: { ...plain.reactions, law: Int32Array.from([0, -1]) },
    };
    const verdict = verdictOn(network, id);
    expectSilence(verdict, /no positive steady state/);
    expect(verdict.hypotheses.at(-1)).toMatchObject({
      claim: 'mass action',
      holds: false,
      witness: { kind: 'arrow', reaction: 0 },
    });
  });

  test.each(['A <=> B', 'A -> B'])(
    'without a proven rank %s is undecided and nothing is concluded',
    (text) => {
      const context = contextOf(buildNetwork(text));
      const unranked = new Proxy(context, {
        get: (of, key) => (key === 'deficiency' ? null : (Reflect.get(of, key, of) as unknown)),
      });
      const { applies, conclusion } = theorems.find((theorem) => theorem.id === id)!.judge(unranked);
      expect(applies).toBe('undecided');
      expect(conclusion).toMatch(/^Undecided/);
    },
  );

  test('undecided where a law does not show whether it vanishes with its reactant', () => {
    const plain = buildNetwork('A -> B');
    const law = {
      expression: { kind: 'call', name: 'sin', arguments: [{ kind: 'name', name: 'A' }] },
      net: false,
      massAction: null,
    } as const;
    const verdict = verdictOn(
      { ...plain, laws: [law], reactions: { ...plain.reactions, law: Int32Array.from([0]) } },
      id,
    );
    expect(verdict.applies).toBe('undecided');
    expect(verdict.conclusion).toMatch(/^If every rate/);
  });

  test('a law of Michaelis and Menten vanishes exactly without its substrate, so case (a) applies', () => {
    const plain = buildNetwork('S -> P');
    const name = (text: string) => ({ kind: 'name', name: text }) as const;
    const law = {
      expression: {
        kind: 'binary',
        operator: '/',
        left: { kind: 'binary', operator: '*', left: name('V'), right: name('S') },
        right: { kind: 'binary', operator: '+', left: name('K'), right: name('S') },
      },
      net: false,
      massAction: null,
    } as const;
    const verdict = verdictOn(
      { ...plain, laws: [law], reactions: { ...plain.reactions, law: Int32Array.from([0]) } },
      id,
    );
    expect(verdict.applies).toBe('yes');
  });

  test('fixed species count as constants: A + X -> 2 X, X -> 0 has deficiency 1 with A fixed', () => {
    expect(judge(id, 'A + X -> 2 X; X -> 0').applies).toBe('yes');
    expect(judge(id, 'A + X -> 2 X; X -> 0', { fixed: { A: 1 } }).applies).toBe('no');
  });
});
