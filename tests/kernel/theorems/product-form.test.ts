import type { Expression } from '@stillroom/shared/expression';
import type { Network, Rational } from '@stillroom/shared/network';
import { rational, toDouble } from '@stillroom/kernel/exact';
import { describe, expect, test } from 'vitest';
import { buildNetwork } from '../../support/network.ts';
import { expectSilence, judge, verdictOn } from '../../support/verdicts.ts';

const name = (text: string): Expression => ({ kind: 'name', name: text });
const count = name('n');
const three: Expression = { kind: 'number', value: 3 };

describe('stationary law of product form', () => {
  const id = 'product-form';

  test('the enzyme mechanism, open and closed (Anderson, Craciun, Kurtz 2010)', () => {
    const closed = judge(id, 'E + S <=> ES; ES <=> E + P');
    expect(closed).toMatchObject({ applies: 'yes', scope: 'all constants' });
    expect(closed.conclusion).toContain('Γ is finite here');
    const open = judge(id, 'E + S <=> ES; ES <=> E + P; 0 <=> S; 0 <=> P; 0 <=> E');
    expect(open.applies).toBe('undecided');
    expect(open.conclusion).toMatch(/^Needs values/);
    expect(judge(id, 'E + S <=> ES; 0 <=> S; 0 <=> E')).toMatchObject({
      applies: 'yes',
      scope: 'all constants',
    });
  });

  test('independent Poisson only where every state can be reached from every other', () => {
    expect(judge(id, '0 <=> A; A <=> B').conclusion).toContain(
      'the counts are independent Poisson with means C',
    );
    // 2 A pairs up: from no molecules only even counts arise.
    expect(judge(id, '0 <=> 2 A').conclusion).toContain('only where Γ is the whole lattice');
  });

  test.each([3, 10, 40])(
    'a zero-range ring of %i sites, closed and open (Spitzer 1970; Evans, Hanney 2005)',
    (sites) => {
      const ring = Array.from({ length: sites }, (_, i) => `X${i + 1} -> X${((i + 1) % sites) + 1}`).join(
        '; ',
      );
      expect(judge(id, ring)).toMatchObject({ applies: 'yes', scope: 'all constants' });
      expect(judge(id, `${ring}; 0 <=> X1`)).toMatchObject({ applies: 'yes', scope: 'all constants' });
      expect(judge('mass-transport', ring).applies).toBe('yes');
    },
  );

  test('deficiency zero without weak reversibility (Cappelletti, Wiuf 2016)', () => {
    expect(judge(id, 'E + S <=> ES; ES -> E + P')).toMatchObject({ applies: 'yes', case: 'deficiency zero' });
  });

  test('constants that are not complex balanced: "no" claims nothing about the law', () => {
    const verdict = judge(id, '0 <=> X; 2 X <=> 3 X', { constants: [6, 11, 6, 1] });
    expectSilence(verdict, /is not of product form|no product form/);
  });

  test('weights: a bounded server needs C below its limit, min(n, 3) with C = 2 and C = 4', () => {
    const applies = (birth: number): string => {
      const servers: Expression = {
        kind: 'call',
        name: 'min',
        arguments: [
          { kind: 'name', name: 'n' },
          { kind: 'number', value: 3 },
        ],
      };
      return verdictOn(
        { ...buildNetwork('0 <=> X', { constants: [birth, 1] }), weights: new Map([[0, servers]]) },
        id,
      ).applies;
    };
    expect([applies(2), applies(4), applies(3)]).toEqual(['yes', 'no', 'no']);
  });

  test('the volume counts: min(n, 3) with c = 2 and V = 2 has C = 4 and no stationary law', () => {
    const applies = (volume: Network['compartments'], amount: string | null): string => {
      const plain = buildNetwork('0 <=> X', { constants: [2, 1] });
      const servers: Expression = { kind: 'call', name: 'min', arguments: [count, three] };
      const network = {
        ...plain,
        compartments: volume,
        units: { ...plain.units, amount },
        weights: new Map([[0, servers]]),
      };
      return verdictOn(network, id).applies;
    };
    const of = (value: Rational, unit: string | null): Network['compartments'] => [
      { name: 'V', volume: { value: toDouble(value), exact: value }, unit, species: [] },
    ];
    expect(applies(of(rational(1n), null), null)).toBe('yes');
    expect(applies(of(rational(2n), null), null)).toBe('no');
    // 2 nM in 1 fL are 1.2 molecules; 2 uM in 1 fL are 1204.
    expect(applies(of(rational(1n), 'fL'), 'nM')).toBe('yes');
    expect(applies(of(rational(1n), 'fL'), 'uM')).toBe('no');
    // Molar amounts without a volume make no counts.
    expect(applies([], 'uM')).toBe('undecided');
  });

  test('a weight is positive for every n or the verdict is open', () => {
    const op = (operator: '+' | '-' | '*' | '/', left: Expression, right: Expression): Expression => ({
      kind: 'binary',
      operator,
      left,
      right,
    });
    const on = (weight: Expression): string =>
      verdictOn({ ...buildNetwork('X <=> Y', { constants: [1, 1] }), weights: new Map([[0, weight]]) }, id)
        .applies;
    const whole = (value: number): Expression => ({ kind: 'number', value });
    const half = op('/', whole(1), whole(2));
    expect(on(op('+', whole(1), op('/', three, count)))).toBe('yes');
    expect(on(op('-', count, half))).toBe('yes');
    expect(on(op('-', count, whole(1)))).toBe('no');
    // Zero at n = 300, beyond what is evaluated.
    expect(on(op('*', count, op('-', whole(300), count)))).toBe('undecided');
    // A constant without a value is not held against it.
    const missing = { ...buildNetwork('X <=> Y'), weights: new Map([[0, op('*', name('k1'), count)]]) };
    expect(verdictOn(missing, id).applies).toBe('undecided');
  });

  test('a weight whose growth cannot be read is left open', () => {
    const odd: Expression = {
      kind: 'binary',
      operator: '+',
      left: { kind: 'number', value: 2 },
      right: { kind: 'call', name: 'sin', arguments: [{ kind: 'name', name: 'n' }] },
    };
    expect(
      verdictOn({ ...buildNetwork('0 <=> X', { constants: [1, 1] }), weights: new Map([[0, odd]]) }, id)
        .applies,
    ).toBe('undecided');
  });
});

describe('laws in counts', () => {
  test('law = k*A^2 is mass action in rate equations but no falling factorial in counts', () => {
    const plain = buildNetwork('2 A <=> B', { constants: [1, 1] });
    const square: Expression = {
      kind: 'binary',
      operator: '*',
      left: { kind: 'name', name: 'k1' },
      right: {
        kind: 'binary',
        operator: '^',
        left: { kind: 'name', name: 'A' },
        right: { kind: 'number', value: 2 },
      },
    };
    const network = {
      ...plain,
      laws: [{ expression: square, net: false, massAction: 0 }],
      reactions: { ...plain.reactions, law: Int32Array.from([0, -1]) },
    };
    expect(verdictOn(network, 'complex-balance').applies).toBe('yes');
    const verdict = verdictOn(network, 'product-form');
    expectSilence(verdict, /not of product form/);
    expect(verdict.hypotheses[0]).toMatchObject({ holds: false, witness: { kind: 'arrow', reaction: 0 } });
  });
});

describe('product form at all times', () => {
  const id = 'product-form-all-times';
  const pairs = '0 <=> A; 0 <=> B; 2 A <=> 2 B';
  const constants = [1, 1, 1, 1, 1, 1];

  test('without larger complexes always (Jahnke, Huisinga 2007)', () => {
    expect(judge(id, '0 <=> A; A <=> B')).toMatchObject({ applies: 'yes', scope: 'all constants' });
    expect(judge('monomolecular', '0 <=> A; A <=> B').applies).toBe('yes');
  });

  test('0 <=> A, 0 <=> B, 2 A <=> 2 B: yes from (1, 1/1), though not stationary from (3, 3) (Anderson, Schnoerr, Yuan 2020)', () => {
    expect(judge(id, pairs, { constants, start: { A: 1, B: 1 } }).applies).toBe('yes');
    expect(judge(id, pairs, { constants, start: { A: 3, B: 3 } }).applies).toBe('yes');
  });

  test('no from (1/2, 5/2): 2 A receives 25/4 and loses 1/4 at once', () => {
    const verdict = judge(id, pairs, { constants, start: { A: '1/2', B: '5/2' } });
    expect(verdict.applies).toBe('no');
    expect(verdict.hypotheses.at(-1)!.text).toContain(
      'At 2 A the coefficient of t^0 of inflow minus outflow is 6',
    );
    expect(verdict.conclusion).toContain('says nothing about the stationary law');
  });

  test('a first derivative can decide: 2 A <=> B in balance at the start while A is being washed in', () => {
    // a = 1, b = 1: 2 A <=> B balances; then A rises with rate 1.
    const verdict = judge(id, '2 A <=> B; 0 -> A', { constants: [1, 1, 1], start: { A: 1, B: 1 } });
    expect(verdict.applies).toBe('no');
    expect(verdict.hypotheses.at(-1)!.text).toContain('t^1');
  });

  test('yes from a complex-balanced start; undecided without values or start', () => {
    expect(judge(id, '2 A <=> B', { constants: [1, 4], start: { A: 2, B: 1 } }).applies).toBe('yes');
    expect(judge(id, '2 A <=> B', { constants: [1, 4] }).applies).toBe('undecided');
    expect(judge(id, '2 A <=> B').applies).toBe('undecided');
  });

  test('"no" of the monomolecular theorem claims nothing', () => {
    expectSilence(judge('monomolecular', '2 A <=> B'), /not Poisson/);
  });
});

describe('mass transport', () => {
  test('reactions of another kind: "no" claims nothing', () => {
    expectSilence(judge('mass-transport', 'A + B <=> C'), /is not stationary|no stationary/);
  });

  test('undecided without values where the balance depends on them', () => {
    expect(judge('mass-transport', 'X1 <=> X2; 2 X1 <=> 2 X2').applies).toBe('undecided');
    expect(judge('mass-transport', 'X1 <=> X2; 2 X1 <=> 2 X2', { constants: [1, 2, 1, 4] }).applies).toBe(
      'yes',
    );
    expect(judge('mass-transport', 'X1 <=> X2; 2 X1 <=> 2 X2', { constants: [1, 2, 1, 5] }).applies).toBe(
      'no',
    );
  });
});
