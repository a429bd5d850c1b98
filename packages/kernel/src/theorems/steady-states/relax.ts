import { solveDense } from '../../intervals/index.ts';
import type { MassActionSystem } from './mass-action-system.ts';
import { production, productionJacobian, totalsOf } from './mass-action-system.ts';

/** Steps that one descent may take. */
const STEPS = 80;
const NEWTON_STEPS = 40;

/**
 * Follows the rate equations from a positive state to a steady state of its class by implicit Euler steps of growing
 * length, each a single linear solve, and ends with Newton's method. Finds stable states from afar and unstable ones
 * from nearby; null where it does not settle.
 */
export function relax(
  system: MassActionSystem,
  constants: readonly number[],
  start: readonly number[],
): number[] | null {
  let x = [...start];
  let step = 0.1 / speed(system, constants, x);
  if (!Number.isFinite(step)) return polish(system, constants, x, totalsOf(system, start));
  for (let k = 0; k < STEPS; k++) {
    const slope = production(system, constants, x);
    const matrix = productionJacobian(system, constants, x).map((row, i) =>
      row.map((entry, l) => (i === l ? 1 / step : 0) - entry),
    );
    const move = solveDense(matrix, slope);
    if (move === null) {
      step /= 4;
      continue;
    }
    const shrink = positivePart(x, move);
    x = x.map((value, i) => value + shrink * move[i]!);
    if (shrink === 1) step *= 2;
    else step *= 0.5;
    const relative = move.reduce((most, value, i) => Math.max(most, Math.abs(value) / x[i]!), 0);
    if (relative < 1e-9 && shrink === 1) break;
  }
  return polish(system, constants, x, totalsOf(system, start));
}

/** Newton's method on the steady-state equations with given totals; null where it leaves the positive states. */
export function polish(
  system: MassActionSystem,
  constants: readonly number[],
  start: readonly number[],
  totals: readonly number[],
): number[] | null {
  let x = [...start];
  for (let k = 0; k < NEWTON_STEPS; k++) {
    const slope = production(system, constants, x);
    const jacobian = productionJacobian(system, constants, x);
    const held = totalsOf(system, x);
    const matrix = [...system.pivotSpecies.map((i) => jacobian[i]!), ...system.lawNumbers];
    const right = [
      ...system.pivotSpecies.map((i) => -slope[i]!),
      ...totals.map((total, i) => total - held[i]!),
    ];
    const scaled = matrix.map((row) => row.map((entry, i) => entry * x[i]!));
    const move = solveDense(scaled, right);
    if (move === null) return null;
    const size = move.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    if (!Number.isFinite(size)) return null;
    // Shortened where a full step would leave the positive states.
    const factor = size > 0.7 ? 0.7 / size : 1;
    x = x.map((value, i) => value * (1 + factor * move[i]!));
    if (size < 1e-15) return x;
    if (size < 1e-12 && k > 4) return x;
  }
  return null;
}

/** The largest factor ≤ 1 that keeps every species above a tenth of its value. */
function positivePart(x: readonly number[], move: readonly number[]): number {
  let factor = 1;
  x.forEach((value, i) => {
    if (move[i]! < 0) factor = Math.min(factor, (0.9 * value) / -move[i]!);
  });
  return factor;
}

function speed(system: MassActionSystem, constants: readonly number[], x: readonly number[]): number {
  const jacobian = productionJacobian(system, constants, x);
  return Math.max(
    ...jacobian.map((row) => row.reduce((sum, entry) => sum + Math.abs(entry), 0)),
    Number.MIN_VALUE,
  );
}
