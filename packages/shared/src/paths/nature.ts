import type { CellKind } from '../cells/kind.ts';
import type { PathStep } from './path.ts';

/**
 * Places of results whose numbers come out of floating-point computing, also where one happens to be whole. `==`
 * refuses them. Elsewhere a whole number and a text like "3/2" are exact, and any other number is measured.
 */
const measuredPlaces: Partial<Record<CellKind, readonly string[]>> = {
  balance: ['residual', 'nearest', 'entropyProduction', 'equilibrium', 'cycles', 'constants', 'start'],
  trajectory: ['times', 'species', 'derived', 'conservationDrift', 'sensitivities'],
};

/** Whether the numbers at a place of a result are measured whatever they look like. */
export function isMeasuredPlace(kind: CellKind, steps: readonly PathStep[]): boolean {
  return measuredPlaces[kind]?.some((place) => place === steps[0]) ?? false;
}

/** Which unit of the network's text the numbers at a place are in. */
const unitPlaces: Partial<Record<CellKind, Readonly<Record<string, 'time' | 'amount'>>>> = {
  network: { start: 'amount' },
  trajectory: { times: 'time', species: 'amount' },
  balance: { equilibrium: 'amount' },
};

function member(value: unknown, key: PathStep): unknown {
  return typeof value === 'object' && value !== null && Object.hasOwn(value, key)
    ? (value as Record<PathStep, unknown>)[key]
    : undefined;
}

/** The unit of the numbers at a place of a result, as printed ("uM"); null where they have none. */
export function unitAt(kind: CellKind, result: unknown, steps: readonly PathStep[]): string | null {
  const [first, second] = steps;
  if (kind === 'network' && first === 'constants' && second !== undefined) {
    const unit = member(member(member(result, 'constants'), second), 'unit');
    return typeof unit === 'string' ? unit : null;
  }
  const which = typeof first === 'string' ? unitPlaces[kind]?.[first] : undefined;
  if (which === undefined) return null;
  const unit = member(member(result, 'units'), which);
  return typeof unit === 'string' ? unit : null;
}
