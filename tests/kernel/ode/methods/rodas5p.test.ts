import { rodas5p } from '../../../../packages/kernel/src/ode/methods/rodas5p/tableau.ts';
import { prepareSystem } from '@stillroom/kernel/ode';
import { odeSystem, rateEquations, resolveValues } from '@stillroom/kernel/rates';
import { describe, expect, test } from 'vitest';
import { fixedStepErrors, observedOrder } from '../../../support/measured-order.ts';
import { binary, name, networkOf, num } from '../../../support/network-of.ts';
import { density, dot, multiply, orderOf, rootedTrees, stageWeights } from '../../../support/rooted-trees.ts';

const { stages, gamma } = rodas5p;
const indices = Array.from({ length: stages }, (_, i) => i);
const unit = (i: number): number[] => indices.map((j) => (i === j ? 1 : 0));
const plus = (a: readonly number[], b: readonly number[]): number[] =>
  indices.map((j) => (a[j] ?? 0) + (b[j] ?? 0));

/** Stage arguments in terms of the K: the published rows, then each the one before plus the K before. */
const rows: number[][] = [];
for (const i of indices)
  rows.push(i < rodas5p.a.length ? plus(rodas5p.a[i]!, []) : plus(rows[i - 1]!, unit(i - 1)));
const solution = plus(rows[stages - 1]!, unit(stages - 1));
const embedded = rows[stages - 1]!;

/** Γ = (I/γ − C)^(−1), lower triangular, by forward substitution column by column. */
const Gamma = indices.map(() => indices.map(() => 0));
for (const column of indices) {
  for (const row of indices) {
    const known = dot(
      rodas5p.c[row]!.slice(0, row),
      indices.slice(0, row).map((k) => Gamma[k]![column]!),
    );
    Gamma[row]![column] = gamma * ((row === column ? 1 : 0) + known);
  }
}
const timesGamma = (weights: readonly number[]): number[] =>
  indices.map((j) =>
    dot(
      weights,
      indices.map((i) => Gamma[i]![j]!),
    ),
  );
const alpha = rows.map(timesGamma);
const beta = alpha.map((row, i) => plus(row, Gamma[i]!));

describe('the coefficients of Rodas5P (Steinebach 2023)', () => {
  test.each(rootedTrees(5).map((tree) => [JSON.stringify(tree), tree] as const))(
    'the solution satisfies the order condition of the tree %s',
    (_, tree) => {
      const weights = stageWeights(tree, alpha, beta);
      expect(Math.abs(dot(timesGamma(solution), weights) - 1 / density(tree))).toBeLessThan(2e-12);
      if (orderOf(tree) > 4) return;
      expect(Math.abs(dot(timesGamma(embedded), weights) - 1 / density(tree))).toBeLessThan(2e-12);
    },
  );

  test('dense output satisfies the conditions of order 4 inside the step', () => {
    for (const theta of [0.1, 0.25, 0.5, 0.8, 0.95]) {
      const inner = indices.map((i) => {
        const [d1, d2, d3] = rodas5p.dense;
        return (1 - theta) * (d1[i]! + theta * (d2[i]! + theta * d3[i]!)) * theta + theta * solution[i]!;
      });
      for (const tree of rootedTrees(4)) {
        const value = dot(timesGamma(inner), stageWeights(tree, alpha, beta));
        expect(Math.abs(value - theta ** orderOf(tree) / density(tree))).toBeLessThan(1e-11);
      }
    }
  });

  test('times and weights of the time derivative are the row sums of α and Γ', () => {
    const ones = indices.map(() => 1);
    multiply(alpha, ones).forEach((sum, i) => expect(sum).toBeCloseTo(rodas5p.times[i]!, 11));
    multiply(Gamma, ones).forEach((sum, i) => expect(sum).toBeCloseTo(rodas5p.timeWeights[i]!, 11));
  });
});

/** x' = −2 t x² with x(0) = 1: x = 1/(1 + t²), neither linear nor autonomous. */
const rational = networkOf({
  reactions: [],
  initial: { X: 1 },
  rateRules: { X: binary(binary(num(-2), '*', name('t')), '*', binary(name('X'), '^', num(2))) },
});

describe('Rodas5P at work', () => {
  test('halving the step divides the error by 2^5, dense output inside a step by 2^5', () => {
    const exact = (t: number): number => 1 / (1 + t * t);
    const coarse = fixedStepErrors(rational, 'stiff', 10, exact);
    const fine = fixedStepErrors(rational, 'stiff', 20, exact);
    expect(observedOrder(coarse.end, fine.end)).toBeGreaterThan(4.7);
    expect(observedOrder(coarse.inside, fine.inside)).toBeGreaterThan(4.6);
  });

  test('pivots by size give the step that the fixed order gives', () => {
    const network = networkOf({
      reactions: [
        { from: { A: 1 }, to: { B: 1 }, k: 0.04 },
        { from: { B: 2 }, to: { B: 1, C: 1 }, k: 3e7 },
        { from: { B: 1, C: 1 }, to: { A: 1, C: 1 }, k: 1e4 },
      ],
    });
    const equations = rateEquations(network, resolveValues(network, {}));
    const prepared = prepareSystem(odeSystem(equations), { kinds: ['stiff'] });
    prepared.setParameters(equations.parameterValues);
    const { state, next, absoluteTolerance } = prepared.common;
    prepared.vector(absoluteTolerance).fill(1e-9);
    const stepper = prepared.stepper('stiff', { rhs: 0, jacobians: 0, factorizations: 0 });
    prepared.vector(state).set([0.9, 3e-5, 0.1]);
    stepper.restart();
    stepper.attempt(0, 0.01);
    const fixed = prepared.vector(next).slice();
    prepared.vector(next).fill(0);
    prepared.assembly.routine('rodas5p.attemptPivoting')();
    prepared.vector(next).forEach((value, i) => expect(Math.abs(value / fixed[i]! - 1)).toBeLessThan(1e-12));
  });

  test('a mode a million times faster than the step dies out (L-stability)', () => {
    const decay = networkOf({ reactions: [{ from: { X: 1 }, to: {}, k: 1e7 }], initial: { X: 1 } });
    expect(fixedStepErrors(decay, 'stiff', 10, (t) => Math.exp(-1e7 * t)).end).toBeLessThan(1e-40);
  });
});
