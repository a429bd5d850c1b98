import { dormandPrince } from '../../../../packages/kernel/src/ode/methods/dormand-prince/tableau.ts';
import { describe, expect, test } from 'vitest';
import { fixedStepErrors, observedOrder } from '../../../support/measured-order.ts';
import { binary, name, networkOf, num } from '../../../support/network-of.ts';
import { density, dot, orderOf, rootedTrees, stageWeights } from '../../../support/rooted-trees.ts';

const stages = dormandPrince.stages;
const indices = Array.from({ length: stages }, (_, i) => i);
const matrix = dormandPrince.a.map((row: readonly number[]) => indices.map((j) => row[j] ?? 0));
const solution = matrix[stages - 1]!;
const embedded = solution.map((weight, i) => weight - dormandPrince.error[i]!);

/** Weights of the solution inside the step, from the vectors r_1 to r_5 of the dense output. */
function inside(theta: number): number[] {
  return indices.map((i) => {
    const rest = 1 - theta;
    const change = solution[i]!;
    const third = (i === 0 ? 1 : 0) - change;
    const fourth = change - (i === stages - 1 ? 1 : 0) - third;
    return theta * (change + rest * (third + theta * (fourth + rest * dormandPrince.dense[i]!)));
  });
}

describe('the coefficients of Dormand–Prince 5(4) (Dormand, Prince 1980)', () => {
  test.each(rootedTrees(5).map((tree) => [JSON.stringify(tree), tree] as const))(
    'the solution satisfies the order condition of the tree %s',
    (_, tree) => {
      const weights = stageWeights(tree, matrix, matrix);
      expect(Math.abs(dot(solution, weights) - 1 / density(tree))).toBeLessThan(1e-14);
      if (orderOf(tree) > 4) return;
      expect(Math.abs(dot(embedded, weights) - 1 / density(tree))).toBeLessThan(1e-14);
    },
  );

  test('dense output satisfies the conditions of order 4 inside the step', () => {
    for (const theta of [0.1, 0.25, 0.5, 0.8, 0.95]) {
      for (const tree of rootedTrees(4)) {
        const value = dot(inside(theta), stageWeights(tree, matrix, matrix));
        expect(Math.abs(value - theta ** orderOf(tree) / density(tree))).toBeLessThan(1e-14);
      }
    }
  });

  test('the times are the row sums', () => {
    matrix.forEach((row, i) =>
      expect(row.reduce((sum, a) => sum + a, 0)).toBeCloseTo(dormandPrince.times[i]!, 14),
    );
  });
});

describe('Dormand–Prince at work', () => {
  test('halving the step divides the error by 2^5, dense output inside a step by 2^5', () => {
    const network = networkOf({
      reactions: [],
      initial: { X: 1 },
      rateRules: { X: binary(binary(num(-2), '*', name('t')), '*', binary(name('X'), '^', num(2))) },
    });
    const exact = (t: number): number => 1 / (1 + t * t);
    const coarse = fixedStepErrors(network, 'nonstiff', 16, exact);
    const fine = fixedStepErrors(network, 'nonstiff', 32, exact);
    expect(observedOrder(coarse.end, fine.end)).toBeGreaterThan(4.7);
    expect(observedOrder(coarse.inside, fine.inside)).toBeGreaterThan(4.6);
  });
});
