import { elementary } from '@stillroom/shared/expression';
import type { Rational } from '../exact/index.ts';
import { echelon, matrixOfRows, toDouble } from '../exact/index.ts';
import { solveDense } from '../intervals/index.ts';
import type { TheoremContext } from '../theorems/context.ts';
import { lnOfInteger } from './log-constants.ts';
import { treeConstants } from './tree-constants.ts';

/**
 * ln c for a complex-balanced state c, by species: (y' − y)·ξ = ln K_{y'} − ln K_y along arrows that join the complexes;
 * s independent ones of these equations are solved, the others follow from the conditions on the constants. Null where
 * the tree constants are not known. Call it only for constants that are complex balanced.
 */
export function balancedLogarithms(context: TheoremContext, constants: readonly Rational[]): number[] | null {
  const trees = treeConstants(context, constants);
  if (trees === null || !context.dense) return null;
  const rows = context.arrows.map(({ from, to }) =>
    context.species.map((_, i) => context.coefficients.scaled(to, i) - context.coefficients.scaled(from, i)),
  );
  const { pivotRows, pivotColumns } = echelon(matrixOfRows(rows, context.species.length));
  const matrix = pivotRows.map((row) => pivotColumns.map((column) => Number(rows[row]![column]!)));
  const right = pivotRows.map((row) => {
    const { from, to } = context.arrows[row]!;
    return lnOfInteger(trees[to]!) - lnOfInteger(trees[from]!);
  });
  const solved = solveDense(matrix, right);
  if (solved === null) return null;
  const logarithms = context.species.map(() => 0);
  // Scaled amounts are scale · x in the exponent: (scaled y)·ξ with ξ = ln x / scale.
  pivotColumns.forEach(
    (column, k) => (logarithms[column] = solved[k]! * Number(context.coefficients.scale[column]!)),
  );
  return logarithms;
}

/** Newton steps, each a convex minimisation's, that finding the state of a class may take. */
const STEPS = 200;

/**
 * The complex-balanced state with given totals W x = T: x = c·e^{Wᵀλ}, where λ minimises the convex function
 * Σ x_i − λ·T (Horn, Jackson 1972). Null where the class has no positive state.
 */
export function balancedStateOfClass(
  context: TheoremContext,
  logarithms: readonly number[],
  start: readonly number[],
): number[] | null {
  const laws = context.lawBasis.map((law) => context.coefficients.unscale(law).map(Number));
  const totals = laws.map((law) => law.reduce((sum, weight, i) => sum + weight * start[i]!, 0));
  const stateAt = (lambda: readonly number[]): number[] =>
    logarithms.map((value, i) =>
      elementary.exp(laws.reduce((sum, law, j) => sum + law[i]! * lambda[j]!, value)),
    );
  const heightAt = (lambda: readonly number[], x: readonly number[]): number =>
    x.reduce((sum, value) => sum + value, 0) - lambda.reduce((sum, value, j) => sum + value * totals[j]!, 0);
  let lambda = laws.map(() => 0);
  let x = stateAt(lambda);
  for (let step = 0; step < STEPS; step++) {
    const gradient = laws.map((law, j) => law.reduce((sum, weight, i) => sum + weight * x[i]!, -totals[j]!));
    const scale = laws.map((law) => law.reduce((sum, weight, i) => sum + Math.abs(weight) * x[i]!, 0));
    if (gradient.every((value, j) => Math.abs(value) <= 4e-16 * scale[j]!)) return x;
    const hessian = laws.map((a) =>
      laws.map((b) => a.reduce((sum, weight, i) => sum + weight * b[i]! * x[i]!, 0)),
    );
    const move = solveDense(
      hessian,
      gradient.map((value) => -value),
    );
    if (move === null) return null;
    const height = heightAt(lambda, x);
    let factor = 1;
    for (;;) {
      const next = lambda.map((value, j) => value + factor * move[j]!);
      const state = stateAt(next);
      if (state.every(Number.isFinite) && heightAt(next, state) <= height + 1e-12 * Math.abs(height)) {
        lambda = next;
        x = state;
        break;
      }
      factor /= 2;
      if (factor < 1e-9) return settled(gradient, scale) ? x : null;
    }
    if (Math.max(...move.map(Math.abs)) < 1e-15) return settled(gradient, scale) ? x : null;
  }
  return null;
}

function settled(gradient: readonly number[], scale: readonly number[]): boolean {
  return gradient.every((value, j) => Math.abs(value) <= 1e-10 * scale[j]!);
}

/** Constants in doubles. */
export function doublesOf(constants: readonly Rational[]): number[] {
  return constants.map(toDouble);
}
