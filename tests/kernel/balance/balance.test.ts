import { describe, expect, test } from 'vitest';
import type { BalanceResult } from '@stillroom/shared/cells';
import { analyseBalance } from '../../../packages/kernel/src/cells/balance.ts';
import type { NetworkOptions } from '../../support/network.ts';
import { buildNetwork } from '../../support/network.ts';

const triangle = '2 A -> A + B; A + B -> 2 B; 2 B -> 2 A';
const balance = (text: string, options: NetworkOptions): BalanceResult =>
  analyseBalance(buildNetwork(text, options));

describe('balance', () => {
  test('tree constants of the triangle are 8 : 4 : 2 and the balanced state has B = A/2 (Craciun et al. 2009)', () => {
    const result = balance(triangle, { constants: [1, 2, 4], start: { A: 3 } });
    const values = result.treeConstants!.map(({ value }) => Number(value));
    expect(values.map((value) => value / values[2]!)).toEqual([4, 2, 1]);
    expect(result.complexConditions).toEqual([
      { expression: 'k2^2 = k1*k3', left: '4', right: '4', holds: true },
    ]);
    expect(result.equilibrium!.B! / result.equilibrium!.A!).toBeCloseTo(1 / 2, 14);
    expect(result.equilibrium!.A! + result.equilibrium!.B!).toBeCloseTo(3, 13);
    expect(result.residual).toBeLessThan(1e-14);
  });

  test('the nearest balanced constants of (1, 1, 4) lie at ln 4 / √6 and satisfy the condition', () => {
    // Least change on the plane 2 ln k2 = ln k1 + ln k3: the distance of (0, 0, ln 4) from it.
    const { nearest, complexBalanced } = balance(triangle, { constants: [1, 1, 4] });
    expect(complexBalanced).toBe(false);
    expect(nearest!.distance).toBeCloseTo(Math.log(4) / Math.sqrt(6), 10);
    const { k1, k2, k3 } = nearest!.constants;
    expect(k2! ** 2 / (k1! * k3!)).toBeCloseTo(1, 11);
  });

  test('nearest constants of a reversible network satisfy conditions that are not monomial', () => {
    const options = { constants: [2, 1, 3, 1, 1, 6] };
    const { nearest } = balance('2 A <=> A + B; A + B <=> 2 B; 2 B <=> 2 A', options);
    const again = balance('2 A <=> A + B; A + B <=> 2 B; 2 B <=> 2 A', {
      constants: ['k1', 'k2', 'k3', 'k4', 'k5', 'k6'].map((name) => nearest!.constants[name]!),
      start: { A: 1, B: 1 },
    });
    const [condition] = again.complexConditions;
    expect(condition!.expression).toContain(' = ');
    // Rounded to doubles they balance up to rounding only.
    expect(again.residual).toBeLessThan(1e-12);
  });

  test('circuit closes, forest fails (Feinberg 1989), with affinities 0 and ln(2/3)', () => {
    const result = balance('2 A <=> A + B; A + B <=> 2 B; 2 B <=> 2 A', {
      constants: [2, 1, 3, 1, 1, 6],
      start: { A: 3 },
    });
    expect(result.detailedConditions).toMatchObject([
      { kind: 'circuit', expression: 'k1*k3*k5 = k2*k4*k6', left: '6', right: '6', holds: true },
      { kind: 'forest', expression: 'k1^2*k5 = k2^2*k6', left: '4', right: '6', holds: false },
    ]);
    expect(result.cycles.map(({ affinity }) => affinity)).toEqual([0, expect.closeTo(Math.log(2 / 3), 14)]);
    expect(result.entropyProduction).toBeGreaterThan(0);
  });

  test('a driven ring: affinity ln 8, entropy production (J+ − J−) ln 8 with J = 1 (Schnakenberg 1976)', () => {
    // A <=> B <=> C <=> A with 2 forwards, 1 backwards: the state is uniform; 3 (2 − 1) ln 2 at A = B = C = 1.
    const result = balance('A <=> B; B <=> C; C <=> A', { constants: [2, 1, 2, 1, 2, 1], start: { A: 3 } });
    expect(result).toMatchObject({ complexBalanced: true, detailedBalanced: false, stateOf: 'start' });
    expect(result.cycles[0]).toMatchObject({
      kind: 'circuit',
      coefficients: { 'A -> B': 1, 'B -> C': 1, 'C -> A': 1 },
    });
    expect(result.cycles[0]!.affinity).toBeCloseTo(Math.log(8), 14);
    expect(result.entropyProduction).toBeCloseTo(3 * Math.log(2), 12);
  });

  test('detailed balance implies complex balance and no entropy production; p − s conditions in all', () => {
    const text = '2 A <=> A + B; A + B <=> 2 B; 2 B <=> 2 A';
    const result = balance(text, { constants: [2, 1, 2, 1, 1, 4], start: { A: 3 } });
    expect(result).toMatchObject({ detailedBalanced: true, complexBalanced: true, entropyProduction: 0 });
    expect(result.detailedConditions).toHaveLength(3 - 1);
  });

  test('constants of the settings replace those of the text, as the decimals they print as', () => {
    const network = buildNetwork(triangle, { constants: [1, 1, 4] });
    const result = analyseBalance(network, { k2: 0.2, k3: 0.04 });
    expect(result.complexConditions[0]).toMatchObject({ left: '1/25', right: '1/25', holds: true });
    expect(() => analyseBalance(network, { q: 1 })).toThrow(/no constant of that name/);
  });

  test('without values: the conditions are written, nothing is decided, and why is said', () => {
    const result = balance(triangle, {});
    expect(result.complexConditions).toEqual([
      { expression: 'k2^2 = k1*k3', left: null, right: null, holds: null },
    ]);
    expect(result).toMatchObject({
      complexBalanced: null,
      why: 'Needs values: k1 has no value.',
      nearest: null,
      residual: null,
    });
  });

  test('powers of any height are compared exactly, without writing them out', () => {
    // Two classes tied by one relation: (k1/k2)^2000 = k3/k4.
    const text = '0 <=> A; 1000 A <=> 3000 A';
    const yes = balance(text, { constants: ['3/2', 1, 12, 1] });
    expect(yes.complexConditions[0]).toMatchObject({ holds: false });
    const power = (3n ** 2000n).toString();
    const lower = (2n ** 2000n).toString();
    const balanced = balance(text, { constants: ['3/2', 1, power, lower] });
    expect(balanced.complexConditions[0]).toMatchObject({ holds: true, left: null, right: null });
  });

  test('a constant that is 0 leaves balance open and says so', () => {
    const result = balance('A <=> B', { constants: [0, 1] });
    expect(result).toMatchObject({ complexBalanced: null, detailedBalanced: null, nearest: null });
    expect(result.why).toContain('k1 is 0');
  });

  test('coefficients of a million and an empty network have defined answers', () => {
    expect(balance('1000000 A <=> B', { constants: [1, 2], start: { A: 1 } }).complexBalanced).toBe(true);
    expect(balance('', {})).toMatchObject({ complexBalanced: true, complexConditions: [], cycles: [] });
  });
});
