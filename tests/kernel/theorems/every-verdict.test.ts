import { readNetwork } from '@stillroom/shared/notation';
import type { Applies, VerdictId } from '@stillroom/shared/cells';
import { verdictIds } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import { contextOf } from '@stillroom/kernel/theorems';
import { describe, expect, test } from 'vitest';
import { withIsomerisations } from '../../support/huge-networks.ts';
import { buildNetwork } from '../../support/network.ts';
import { verdictOn } from '../../support/verdicts.ts';

/** A network in the notation, its verdict, and where that is published or how it is derived. */
type Case = readonly [applies: Applies, text: string, source: string];

const lotkaVolterra = 'A -> 2 A | 1\nA + B -> 2 B | 1\nB -> 0 | 1';
const enzyme = 'E + S <=> ES\nES -> E + P';
const edelstein = 'A <=> 2 A\nA + B <=> C\nC <=> B';
const triangle = '2 A -> A + B | %\nA + B -> 2 B | %\n2 B -> 2 A | %';
const shinarFeinberg = 'A + B -> 2 B\nB -> A';
/** 2^14 minimal siphons, each of which holds a law: more than are looked at. */
const manySiphons = Array.from({ length: 14 }, (_, i) => `X${i} + Y${i} <=> 2 Z`).join('\n');
/** Nothing can be read off a sine. */
const unclear = (rows: string): string => `${rows}\nQ -> R | law = 2 + sin(Q)`;

const withConstants = (text: string, ...values: (number | string)[]): string => {
  let at = 0;
  return text.replaceAll('%', () => String(values[at++]));
};

const cases: Readonly<Record<VerdictId, readonly Case[]>> = {
  'deficiency-zero': [
    ['yes', enzyme, 'Feinberg 1987: not weakly reversible, no positive steady state'],
    ['no', edelstein, 'Edelstein 1970: deficiency 1 (Feinberg 1987)'],
    ['undecided', 'A -> B | law = sin(A)', 'derived: the law may vanish while A is present'],
  ],
  'deficiency-one': [
    ['yes', '2 A -> A + B\nA + B -> 2 B\n2 B -> 2 A', 'Feinberg 1987, 1995: δ = 1 in one linkage class'],
    ['no', edelstein, 'Feinberg 1987: δ = 1, both linkage classes have δ_i = 0'],
  ],
  'complex-balance': [
    ['yes', withConstants(triangle, 1, 2, 4), 'theory of tree constants: k2² = k1 k3 (Craciun et al. 2009)'],
    ['no', withConstants(triangle, 1, 1, 4), 'the same condition'],
    ['undecided', triangle.replaceAll(' | %', ''), 'the same condition without values'],
  ],
  'detailed-balance': [
    [
      'yes',
      '2 A <=> A + B | 1, 1\nA + B <=> 2 B | 1, 1\n2 B <=> 2 A | 1, 1',
      'Wegscheider 1901; all constants 1',
    ],
    [
      'no',
      '2 A <=> A + B | 2, 1\nA + B <=> 2 B | 3, 1\n2 B <=> 2 A | 1, 6',
      'Feinberg 1989: the circuit closes, the forest condition fails',
    ],
    ['undecided', '2 A <=> A + B\nA + B <=> 2 B\n2 B <=> 2 A', 'the same conditions without values'],
  ],
  'global-stability': [
    ['yes', 'A + B <=> 2 B', 'Anderson 2011: one linkage class'],
    ['no', lotkaVolterra, 'Lotka 1920: not weakly reversible, so not complex balanced'],
    [
      'undecided',
      'A + B <=> 2 B\nC + D <=> 2 D\nE + F <=> 2 F\nG + H <=> 2 H',
      'derived: rank 4, {B} critical, not strongly endotactic',
    ],
  ],
  existence: [
    ['yes', '2 A -> A + B\nA + B -> 2 B\n2 B -> 2 A', 'Boros 2019'],
    ['no', lotkaVolterra, 'not weakly reversible'],
  ],
  'no-positive-steady-state': [
    ['yes', enzyme, 'Feinberg 1987: P only grows'],
    ['no', lotkaVolterra, 'Lotka 1920: a positive steady state exists'],
    ['undecided', unclear('A -> B'), 'derived: not consistent, but a law may vanish'],
  ],
  'product-form': [
    ['yes', '0 <=> A\nA <=> B', 'Anderson, Craciun, Kurtz 2010; Jackson 1957'],
    ['no', lotkaVolterra, 'not complex balanced, deficiency 1'],
    ['undecided', triangle.replaceAll(' | %', ''), 'complex balance depends on the constants'],
  ],
  'product-form-all-times': [
    ['yes', '0 <=> A\nA <=> B', 'Jahnke, Huisinga 2007'],
    ['no', 'X -> 2 X | 1\nstart X = 1', 'Anderson, Schnoerr, Yuan 2020: 2 X is produced and never consumed'],
    ['undecided', '2 A <=> B', 'the same theorem without values'],
  ],
  monomolecular: [
    ['yes', '0 <=> A\nA <=> B', 'Jahnke, Huisinga 2007'],
    ['no', '2 A <=> B', 'a complex of two molecules'],
  ],
  'robust-species': [
    ['yes', shinarFeinberg, 'Shinar, Feinberg 2010: their toy model, A is robust'],
    ['no', enzyme, 'deficiency 0 and not consistent'],
  ],
  'robust-extinction': [
    ['yes', shinarFeinberg, 'Anderson, Enciso, Johnston 2014: the same toy model in counts'],
    ['no', lotkaVolterra, 'not conservative'],
  ],
  persistence: [
    ['yes', 'E + S <=> ES\nES <=> E + P', 'Angeli, De Leenheer, Sontag 2007'],
    ['no', lotkaVolterra, 'not conservative'],
    ['undecided', manySiphons, 'derived: 2^14 minimal siphons, more than are listed'],
  ],
  'no-boundary-steady-state': [
    [
      'yes',
      'E + S <=> ES\nES <=> E + P',
      'Angeli, De Leenheer, Sontag 2007: {E, ES} and {S, ES, P} hold laws',
    ],
    ['no', '2 A <=> A + B', 'Angeli et al. 2007: {A} is a siphon without law'],
    ['undecided', manySiphons, 'derived: 2^14 minimal siphons, more than are listed'],
  ],
  injective: [
    [
      'yes',
      '0 <=> E + S\nE + S <=> ES\nES <=> E + P\nP <=> 0\nE <=> 0\nS <=> 0\nES <=> 0',
      'Craciun, Feinberg 2005: an enzyme mechanism in a flow reactor',
    ],
    ['no', '0 <=> A\n0 <=> B\nA + B <=> 2 A', 'derived: products of both signs, yet one steady state'],
  ],
  'several-steady-states': [
    ['yes', edelstein, 'Edelstein 1970; Feinberg 1988'],
    ['no', enzyme, 'Feinberg 1987: none at all'],
    ['undecided', 'X -> 2 X\nX -> 0', 'derived: every positive steady state is degenerate'],
  ],
  'at-most-one': [
    [
      'yes',
      'Y -> X\nX + Y -> 0\nX -> 2 X + 2 Z\n2 X -> 0\nZ -> Y',
      'Field, Noyes 1974; one root by elimination',
    ],
    ['no', edelstein, 'Edelstein 1970'],
    ['undecided', 'X -> 2 X\nX -> 0', 'derived: all states are steady at equal constants'],
  ],
  'mass-transport': [
    ['yes', 'X1 -> X2 | 1\nX2 -> X3 | 1\nX3 -> X1 | 1', 'Spitzer 1970: zero-range process on a ring'],
    [
      'no',
      'X1 -> X2 | law = X1\nX2 -> X1 | law = X2\n2 X1 -> 2 X2 | law = X1 - 1\n2 X2 -> 2 X1 | law = X2 - 1\nstart X1 = 4',
      'condition of Evans, Majumdar, Zia 2004; u(1|n) = n, u(2|n) = n − 1 by script',
    ],
    ['undecided', 'X1 <=> X2\n2 X1 <=> 2 X2', 'Greenblatt, Lebowitz 2006: depends on the constants'],
  ],
  'one-dimensional': [
    ['yes', '0 <=> X\n2 X <=> 3 X', 'Schlögl 1972'],
    ['no', enzyme, 'rank 2'],
    ['undecided', 'A -> B | law = sin(t)', 'derived: not autonomous as far as can be read'],
  ],
  'non-explosive': [
    ['yes', 'X -> 2 X', 'Meyn, Tweedie 1993: linear growth (Yule process)'],
    ['no', '2 X -> 3 X', 'Xu, Hansen, Wiuf 2022: R = 2, α > 0'],
    ['undecided', 'A + B -> 2 A + B\nA + B -> A + 2 B', 'derived: two species raise each other'],
  ],
  'positive-recurrent': [
    [
      'yes',
      '0 -> A\n2 A -> 0',
      'derived: A itself drifts inwards (criterion of Gupta, Briat, Khammash 2014)',
    ],
    ['no', '0 -> X | 1\nX -> 2 X | 2\nX -> 0 | 1', 'Xu, Hansen, Wiuf 2022: R = 1, α > 0'],
    ['undecided', lotkaVolterra, 'derived: no linear function'],
  ],
  concordant: [
    ['yes', 'E + S <=> ES\nES -> E + P\n0 -> S\nP -> 0', 'Shinar, Feinberg 2012'],
    ['no', edelstein, 'Edelstein 1970: several steady states'],
    ['undecided', unclear('A <=> B'), 'derived: the law of Q is not known to rise'],
  ],
};

/** Decided at every size, or undecided only for networks too large to be looked at arrow by arrow (below). */
const decidedAtSmallSize: readonly VerdictId[] = [
  'deficiency-one',
  'existence',
  'monomolecular',
  'robust-species',
  'robust-extinction',
  'injective',
];

function networkFrom(text: string): Network {
  const { network, complaints } = readNetwork(text);
  if (network === null) throw new Error(complaints.map(({ message }) => message).join(' '));
  return network;
}

const rows = verdictIds.flatMap((id) => cases[id].map((entry) => [id, ...entry] as const));

test.each(rows)('%s is %s for %s (%s)', (id, applies, text) => {
  expect(verdictOn(networkFrom(text), id).applies).toBe(applies);
});

describe('a network of 60,000 arrows beside Shinar and Feinberg’s', () => {
  const context = contextOf(withIsomerisations(buildNetwork('A + B -> 2 B; B -> A'), 30_000));

  test.each(['robust-species', 'robust-extinction', 'injective', 'concordant'] as const)(
    '%s is undecided and says that the network is too large',
    (id) => {
      const { applies, hypotheses } = context.verdict(id);
      expect(applies).toBe('undecided');
      expect(hypotheses.some(({ holds, text }) => holds === null && /too large/.test(text))).toBe(true);
    },
  );
});

describe('the table is complete', () => {
  test.each(verdictIds)('%s has a yes, a no and, where it can occur, an undecided', (id) => {
    const wanted: Applies[] = decidedAtSmallSize.includes(id) ? ['yes', 'no'] : ['yes', 'no', 'undecided'];
    expect(cases[id].map(([applies]) => applies)).toEqual(wanted);
  });
});
