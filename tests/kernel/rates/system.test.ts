import { prepareSystem } from '@stillroom/kernel/ode';
import { odeSystem, planSensitivities, rateEquations, resolveValues } from '@stillroom/kernel/rates';
import type { Expression } from '@stillroom/shared/expression';
import { readNetwork } from '@stillroom/shared/notation';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { binary, name, networkOf, num, type PlainNetwork } from '../../support/network-of.ts';

function systemOf(plain: PlainNetwork, sensitiveTo: readonly number[] = []) {
  const network = networkOf(plain);
  const equations = rateEquations(network, resolveValues(network, {}));
  const system = odeSystem(equations, {
    sensitivities: planSensitivities(equations, sensitiveTo, new Set(), false),
  });
  const prepared = prepareSystem(system, { kinds: [] });
  prepared.setParameters(equations.parameterValues);
  const { state, next, jacobian } = prepared.common;
  return {
    network,
    system,
    slope(at: readonly number[], time = 0): number[] {
      prepared.vector(state).set(at);
      prepared.rightHandSide(time, state, next);
      return [...prepared.vector(next)];
    },
    /** The Jacobian as a full matrix. */
    jacobian(at: readonly number[], time = 0): number[][] {
      prepared.vector(state).set(at);
      prepared.fastestRate(time, state);
      const { rowStart, columns, size } = system.pattern;
      return Array.from({ length: size }, (_, i) => {
        const row = new Array<number>(size).fill(0);
        for (let e = rowStart[i]!; e < rowStart[i + 1]!; e++)
          row[columns[e]!] = prepared.assembly.memory[jacobian + e]!;
        return row;
      });
    },
  };
}

function expectJacobian(system: ReturnType<typeof systemOf>, at: readonly number[]): void {
  const exact = system.jacobian(at);
  at.forEach((value, j) => {
    const h = 1e-6 * Math.max(1, Math.abs(value));
    const shifted = (by: number) => at.map((x, i) => (i === j ? x + by : x));
    const [up, down] = [system.slope(shifted(h)), system.slope(shifted(-h))];
    exact.forEach((row, i) => {
      const difference = (up[i]! - down[i]!) / (2 * h);
      expect(Math.abs(row[j]! - difference)).toBeLessThan(1e-5 * (1 + Math.abs(difference)));
    });
  });
}

const species = ['A', 'B', 'C'] as const;
const side = fc.dictionary(fc.constantFrom(...species), fc.integer({ min: 1, max: 3 }), { maxKeys: 3 });
const reactions = fc.array(
  fc.record({ from: side, to: side, k: fc.double({ min: 0.1, max: 3, noNaN: true }) }),
  {
    minLength: 1,
    maxLength: 6,
  },
);
const place = fc.double({ min: 0.1, max: 2, noNaN: true });

describe('mass action', () => {
  test('dx/dt is the sum over reactions of k ∏ x^y times the net change', () => {
    fc.assert(
      fc.property(reactions, fc.array(place, { minLength: 3, maxLength: 3 }), (list, values) => {
        const system = systemOf({ reactions: list, initial: { A: 0, B: 0, C: 0 } });
        const at = system.network.species.map((_, i) => values[i]!);
        const expected = system.network.species.map((one) =>
          list.reduce((sum, { from, to, k }) => {
            const rate = Object.entries(from).reduce(
              (v, [other, n]) => v * at[system.network.species.indexOf(other)]! ** n,
              k,
            );
            return sum + rate * ((to[one] ?? 0) - (from[one] ?? 0));
          }, 0),
        );
        system.slope(at).forEach((value, i) => expect(value).toBeCloseTo(expected[i]!, 9));
      }),
      { seed: 21, numRuns: 60 },
    );
  });

  test('its Jacobian agrees with differences, also with sensitivities', () => {
    fc.assert(
      fc.property(reactions, fc.array(place, { minLength: 9, maxLength: 9 }), (list, values) => {
        const sensitiveTo = list.length > 1 ? [0, 1] : [0];
        const plain = { reactions: list, initial: { A: 0, B: 0, C: 0 } };
        expectJacobian(systemOf(plain), values.slice(0, 3));
        expectJacobian(systemOf(plain, sensitiveTo), values.slice(0, 3 * (1 + sensitiveTo.length)));
      }),
      { seed: 22, numRuns: 30 },
    );
  });

  test('has no entry where no species acts on another', () => {
    const { system } = systemOf({
      reactions: [
        { from: { A: 1 }, to: { B: 1 }, k: 1 },
        { from: { C: 1 }, to: {}, k: 1 },
      ],
    });
    expect([...system.pattern.rowStart]).toEqual([0, 1, 2, 3]);
    expect([...system.pattern.columns]).toEqual([0, 0, 2]);
  });
});

describe('laws', () => {
  const call = (text: 'exp' | 'hill' | 'max' | 'if', ...given: Expression[]): Expression => ({
    kind: 'call',
    name: text,
    arguments: given,
  });
  const laws: readonly Expression[] = [
    binary(name('A'), '/', binary(num(1), '+', binary(name('B'), '^', num(3)))),
    call('hill', name('A'), num(0.5), num(2)),
    call('hill', name('A'), num(0.5), num(1.5)),
    call('exp', binary({ kind: 'negate', of: name('A') }, '*', name('B'))),
    call('max', name('A'), binary(name('B'), '^', num(-2))),
    binary(name('A'), '%', num(0.4)),
  ];

  test.each(laws.map((law) => [JSON.stringify(law), law] as const))('%s', (_, law) => {
    expectJacobian(systemOf({ reactions: [{ from: { A: 1 }, to: { B: 2 }, law }] }), [0.77, 1.3]);
  });

  test('and texts of the notation: a net law, fixed species, an output inside a law', () => {
    const { network } = readNetwork(`
      A <=> B  | net = v - kr*B
      F -> A   | kin = 2
      let v = 3*A*(1 + t)
      let kr = 0.5
      fix F = 4
    `);
    const equations = rateEquations(network!, resolveValues(network!, {}));
    const system = odeSystem(equations);
    expect(system.timeDependent).toBe(true);
    const prepared = prepareSystem(system, { kinds: [] });
    prepared.setParameters(equations.parameterValues);
    const { state, next } = prepared.common;
    prepared.vector(state).set([2, 6]);
    prepared.rightHandSide(1, state, next);
    const rate = 3 * 2 * 2 - 0.5 * 6;
    expect([...prepared.vector(next)]).toEqual([-rate + 8, rate]);
  });
});
