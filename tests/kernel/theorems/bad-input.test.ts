import { readNetwork } from '@stillroom/shared/notation';
import type { VerdictId } from '@stillroom/shared/cells';
import { verdictIds } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import { checkWitness, judgeAll } from '@stillroom/kernel/theorems';
import { describe, expect, test } from 'vitest';
import { withIsomerisations } from '../../support/huge-networks.ts';
import { buildNetwork } from '../../support/network.ts';

/** All verdicts by name; where the checker can look, none may be refuted. */
function answers(network: Network): Record<VerdictId, string> {
  const verdicts = judgeAll(network);
  expect(verdicts.map(({ id }) => id).sort()).toEqual([...verdictIds].sort());
  for (const verdict of verdicts) {
    const { ok, why } = checkWitness(network, verdict);
    if (!/too large for this checker/.test(why))
      expect([verdict.id, ok, why]).toEqual([verdict.id, true, why]);
    expect(verdict.conclusion).not.toMatch(/undefined|NaN|null(?! recurrent)|\[object/);
  }
  return Object.fromEntries(verdicts.map(({ id, applies }) => [id, applies])) as Record<VerdictId, string>;
}

function read(text: string): Network {
  const { network, complaints } = readNetwork(text);
  if (network === null) throw new Error(complaints.map(({ message }) => message).join(' '));
  return network;
}

describe('all verdicts on networks that are hard on programs', () => {
  test('an empty network', () => {
    for (const network of [buildNetwork(''), read('')]) {
      expect(answers(network)).toMatchObject({
        'deficiency-zero': 'yes',
        'no-positive-steady-state': 'no',
        'several-steady-states': expect.not.stringMatching('yes') as string,
      });
    }
  });

  test('one complex: a row with equal sides is refused, in a family it writes nothing', () => {
    expect(readNetwork('A -> A').network).toBeNull();
    answers(read('[i = 1..1] X[i] <=> X[i % 1 + 1]'));
  });

  test('the zero complex alone: inflow without outflow', () => {
    expect(answers(buildNetwork('0 -> A'))).toMatchObject({
      'deficiency-zero': 'yes',
      'no-positive-steady-state': 'yes',
      'several-steady-states': 'no',
      'positive-recurrent': 'no',
      'non-explosive': 'yes',
    });
    expect(answers(buildNetwork('A -> 0'))['positive-recurrent']).toBe('yes');
  });

  test('duplicate rows state one arrow: the same verdicts as once', () => {
    const once = answers(read('A + B <=> C | 1, 2\nC -> D | 6\nstart A = 2'));
    const twice = answers(
      read('A + B -> C | 1/2\nA + B -> C | 1/2\nC -> A + B | 2\nC -> D | 2\nC -> D | 4\nstart A = 2'),
    );
    expect(twice).toEqual(once);
  });

  test('a species that never reacts keeps every verdict but adds a law', () => {
    const plain = buildNetwork('E + S <=> ES; ES -> E + P');
    expect(answers({ ...plain, species: [...plain.species, 'Idle'] })).toEqual(answers(plain));
    const open = buildNetwork('0 <=> A');
    answers({ ...open, species: ['A', 'Idle'] });
  });

  test('reactions that cancel, and rows that a held species turns into nothing', () => {
    expect(answers(buildNetwork('A + E -> B + E; B + F -> A + F'))).toMatchObject({
      'one-dimensional': 'yes',
    });
    answers(read('A + X -> 2 X\nX -> 0\nfix A = 1'));
    answers(read('A + X -> X\nX -> A + X\nfix A = 1'));
  });

  test('coefficients of a million', () => {
    expect(answers(buildNetwork('1000000 A <=> B'))).toMatchObject({
      'deficiency-zero': 'yes',
      injective: 'yes',
      'several-steady-states': 'no',
    });
    answers(buildNetwork('1000000 A -> 999999 B; B + 1000000 C -> A; 0 <=> C'));
    answers(buildNetwork('A -> 1000000 A; 2 A -> A', { constants: [1, 1], start: { A: 3 } }));
    answers(buildNetwork('1000000 A + 999999 B <=> 999998 C; C <=> A + B; 1000000 C <=> 999999 A; 0 <=> B'));
  });

  test('families whose index runs empty', () => {
    answers(read('let L = 0\n[i = 1..L] X[i] <=> X[i + 1]'));
    expect(answers(read('let L = 0\n[i = 1..L] X[i] <=> X[i + 1]\nA <=> B'))).toEqual(
      answers(read('A <=> B')),
    );
  });

  test('fractions, constants of 0 and weights that vanish', () => {
    answers(buildNetwork('1/2 A <=> B; 3/7 B -> 5/3 C'));
    answers(read('A <=> B | 0, 1\nstart A = 1'));
    expect(readNetwork('A -> B | 1\nB -> A | 1\nweight A = n - 3').network).toBeNull();
  });

  test('ten thousand linkage classes', () => {
    expect(answers(withIsomerisations(buildNetwork(''), 10_000))).toMatchObject({
      'deficiency-zero': 'yes',
      existence: 'yes',
      'several-steady-states': 'no',
    });
  });
});
