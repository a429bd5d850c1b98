import { readFileSync } from 'node:fs';
import type { Verdict, VerdictId } from '@stillroom/shared/cells';
import type { Expression } from '@stillroom/shared/expression';
import type { Network } from '@stillroom/shared/network';
import { divide, formatRational, rational } from '@stillroom/kernel/exact';
import { exactBalancedState } from '@stillroom/kernel/balance';
import { checkWitness, contextOf, judgeAll } from '@stillroom/kernel/theorems';
import { describe, expect, test } from 'vitest';
import { analyseBalance } from '../../packages/kernel/src/cells/balance.ts';
import { closedMarginals, siteWeights } from '../../packages/kernel/src/theorems/counts/product-form-law.ts';
import type { NetworkOptions } from '../support/network.ts';
import { buildNetwork } from '../support/network.ts';

/** Sharp cases; each says in `why` which mistake it catches and in `source` where it comes from. */
interface Case {
  readonly id: string;
  readonly text: string;
  readonly why: string;
  readonly oracle: {
    readonly counts: { readonly deficiency: number; readonly rank: number };
    readonly consistent: boolean;
    readonly conservative: boolean;
    readonly deficiency_one_theorem_applies: boolean;
    readonly critical_minimal_siphons: readonly (readonly string[])[];
    readonly acr_candidates: readonly { readonly species: string }[];
  };
  readonly expect: {
    readonly verdicts?: Partial<Record<VerdictId, string>>;
    readonly robustSpecies?: readonly string[];
    readonly criticalSiphons?: readonly (readonly string[])[];
  };
}

const { networks } = JSON.parse(readFileSync(new URL('./verdicts.json', import.meta.url), 'utf8')) as {
  networks: Case[];
};
const caseOf = (id: string): Case => networks.find((entry) => entry.id === id)!;

function verdictsOf(network: Network): Map<VerdictId, Verdict> {
  const verdicts = judgeAll(network);
  for (const verdict of verdicts)
    expect([verdict.id, checkWitness(network, verdict).ok]).toEqual([verdict.id, true]);
  return new Map(verdicts.map((verdict) => [verdict.id, verdict]));
}

function on(id: string, options: NetworkOptions = {}): Map<VerdictId, Verdict> {
  return verdictsOf(buildNetwork(caseOf(id).text, options));
}

describe('reference verdicts', () => {
  test.each(networks)('$id: $why', ({ text, oracle, expect: expected }) => {
    const verdicts = verdictsOf(buildNetwork(text));
    for (const [id, applies] of Object.entries(expected.verdicts ?? {})) {
      expect([id, verdicts.get(id as VerdictId)!.applies]).toEqual([id, applies]);
    }
    expect(verdicts.get('deficiency-one')!.applies === 'yes').toBe(oracle.deficiency_one_theorem_applies);
    expect(verdicts.get('no-positive-steady-state')!.applies === 'no').toBe(oracle.consistent);
    expect(verdicts.get('no-boundary-steady-state')!.applies === 'yes').toBe(
      oracle.critical_minimal_siphons.length === 0,
    );
    const pairs = verdicts
      .get('robust-species')!
      .hypotheses.filter(({ claim, holds }) => claim === 'complexes differ in one species' && holds);
    const species = pairs.map(({ text: sentence }) => /only in (\w+)\./.exec(sentence)![1]!);
    if (expected.robustSpecies)
      expect([...new Set(species)].sort()).toEqual([...expected.robustSpecies].sort());
  });

  test('lotka_volterra: both concentrations are robust with the values k3/k2 and k1/k2', () => {
    const verdict = on('lotka_volterra_verdicts', { constants: [2, 3, 5] }).get('robust-species')!;
    expect(verdict.conclusion).toContain('A = 5/3, B = 2/3');
  });

  test('irreversible triangle: the condition is k2^2 = k1 k3, tree constants 8 : 4 : 2 and 4 : 4 : 1, ratio 1/2', () => {
    const { text } = caseOf('irreversible_triangle_condition');
    const yes = analyseBalance(buildNetwork(text, { constants: [1, 2, 4], start: { A: 1 } }));
    expect(yes).toMatchObject({ complexBalanced: true, complexConditions: [{ expression: 'k2^2 = k1*k3' }] });
    expect(ratios(yes.treeConstants!.map(({ value }) => Number(value)))).toEqual(ratios([8, 4, 2]));
    expect(yes.equilibrium!.B! / yes.equilibrium!.A!).toBeCloseTo(1 / 2, 14);
    const no = analyseBalance(buildNetwork(text, { constants: [1, 1, 4] }));
    expect(no.complexBalanced).toBe(false);
    expect(ratios(no.treeConstants!.map(({ value }) => Number(value)))).toEqual(ratios([4, 4, 1]));
  });

  test('Horn and Jackson’s square: three states for ε = 1/10, one for ε = 1/5, balanced only for ε = 1; existence yes', () => {
    const id = 'horn_jackson_square_threshold';
    const three = on(id, { constants: ['1/10', 1, '1/10', 1], start: { A: 6 } });
    expect(three.get('one-dimensional')!.conclusion).toContain('exactly 3 positive steady states');
    expect(three.get('existence')!.applies).toBe('yes');
    const one = on(id, { constants: ['1/5', 1, '1/5', 1], start: { A: 6 } });
    expect(one.get('one-dimensional')!.conclusion).toContain('exactly one positive steady state');
    expect(one.get('complex-balance')!.applies).toBe('no');
    expect(on(id, { constants: [1, 1, 1, 1] }).get('complex-balance')!.applies).toBe('yes');
  });

  test('two servers on two sites: product form with weights min(n, 2)', () => {
    const plain = buildNetwork(caseOf('two_servers_two_sites').text, { constants: [1, 2], start: { X1: 3 } });
    const servers: Expression = {
      kind: 'call',
      name: 'min',
      arguments: [
        { kind: 'name', name: 'n' },
        { kind: 'number', value: 2 },
      ],
    };
    const verdicts = verdictsOf({
      ...plain,
      weights: new Map([
        [0, servers],
        [1, servers],
      ]),
    });
    expect(verdicts.get('product-form')).toMatchObject({ applies: 'yes', case: 'weights' });
    expect(verdicts.get('product-form')!.conclusion).toContain('neither independent');
    const [c1, c2] = exactBalancedState(contextOf(plain))!;
    expect(divide(c1!, c2!)).toEqual(rational(2n));
    const weights = new Map([
      [0, servers],
      [1, servers],
    ]);
    const [marginal] = closedMarginals(contextOf({ ...plain, weights }), 3)!;
    expect(marginal!.map(formatRational)).toEqual(['1/21', '4/21', '8/21', '8/21']);
  });

  test('condensation: weight 1 + b/n is summable for b = 3 and c = 1, not for b = 1/2, nor for c = 2', () => {
    const weight = (b: string): Expression => ({
      kind: 'binary',
      operator: '+',
      left: { kind: 'number', value: 1 },
      right: {
        kind: 'binary',
        operator: '/',
        left: { kind: 'number', value: Number(b), text: b },
        right: { kind: 'name', name: 'n' },
      },
    });
    const applies = (birth: number, b: string): string => {
      const plain = buildNetwork(caseOf('condensation_threshold').text, { constants: [birth, 1] });
      const verdict = verdictsOf({ ...plain, weights: new Map([[0, weight(b)]]) }).get('product-form')!;
      if (verdict.applies === 'no') expect(verdict.conclusion).toContain('nothing follows');
      return verdict.applies;
    };
    expect([applies(1, '3'), applies(1, '0.5'), applies(2, '3')]).toEqual(['yes', 'no', 'no']);
    // Weights 6/((n+1)(n+2)(n+3)) of sum 3/2, hence P = 4/((n+1)(n+2)(n+3)).
    const network = {
      ...buildNetwork(caseOf('condensation_threshold').text, { constants: [1, 1] }),
      weights: new Map([[0, weight('3')]]),
    };
    const terms = siteWeights(contextOf(network), 0, 60)!;
    terms.forEach((term, n) => expect(term).toEqual(rational(6n, BigInt((n + 1) * (n + 2) * (n + 3)))));
    // The tail from N on is 3/((N+1)(N+2)).
    const sum = terms.reduce((total, term) => total + Number(term.numerator) / Number(term.denominator), 0);
    expect(sum + 3 / (62 * 63)).toBeCloseTo(3 / 2, 14);
  });

  test('X -> 2 X, X -> 0 does not stay Poisson: 2 X is only produced', () => {
    const verdict = on('linear_reactants_close', { constants: [2, 1], start: { X: 3 } }).get(
      'product-form-all-times',
    )!;
    expect(verdict).toMatchObject({ applies: 'no', scope: 'these constants and start' });
    expect(verdict.hypotheses.at(-1)!.text).toContain(
      'At 2 X the coefficient of t^0 of inflow minus outflow is 6',
    );
  });

  test('chipping on a ring of three: which rates factorise', () => {
    const { text } = caseOf('chipping_yes_and_no');
    const n = (site: number): Expression => ({ kind: 'name', name: `X${site}` });
    const number = (value: number): Expression => ({ kind: 'number', value });
    const op = (operator: '+' | '-' | '*' | '/', left: Expression, right: Expression): Expression => ({
      kind: 'binary',
      operator,
      left,
      right,
    });
    const ring = (sizes: readonly number[], rate: (m: number, count: Expression) => Expression): string => {
      const hops = sizes.flatMap((m) =>
        [1, 2, 3].map((i) => ({ m, i, text: `${m} X${i} -> ${m} X${(i % 3) + 1}` })),
      );
      const plain = buildNetwork(hops.map((hop) => hop.text).join('; '), { start: { X1: 4 } });
      const network: Network = {
        ...plain,
        laws: hops.map(({ m, i }) => ({ expression: rate(m, n(i)), net: false, massAction: null })),
        reactions: { ...plain.reactions, law: Int32Array.from(hops, (_, k) => k) },
      };
      return verdictsOf(network).get('mass-transport')!.applies;
    };
    const massAction = buildNetwork(text, { constants: [1, 1, 1, 1, 1, 1] });
    expect(verdictsOf(massAction).get('mass-transport')).toMatchObject({
      applies: 'yes',
      conclusion: expect.stringContaining('w(n) = 1/n!') as string,
    });
    const all = [1, 2, 3, 4];
    expect(ring([1, 2], (m, x) => (m === 1 ? x : op('*', x, op('-', x, number(1)))))).toBe('yes');
    expect(ring([1, 2], (m, x) => (m === 1 ? x : op('-', x, number(1))))).toBe('no');
    expect(
      ring(all, (m, x) =>
        op('/', op('+', x, number(1)), op('*', number(m), op('+', op('-', x, number(m)), number(1)))),
      ),
    ).toBe('yes');
    expect(ring(all, () => number(1))).toBe('yes');
    expect(ring(all, (_, x) => x)).toBe('no');
  });

  test('2 A <=> A + B: global stability is proven by one linkage class', () => {
    expect(on('critical_siphon_yet_persistent').get('global-stability')).toMatchObject({
      applies: 'yes',
      case: 'one linkage class',
    });
  });
});

function ratios(values: readonly number[]): number[] {
  return values.map((value) => value / values.at(-1)!);
}
