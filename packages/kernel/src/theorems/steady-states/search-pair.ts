import { elementary } from '@stillroom/shared/expression';
import { fromDouble } from '../../exact/index.ts';
import { solveDense } from '../../intervals/index.ts';
import type { TheoremContext } from '../context.ts';
import { fixedSequence } from '../fixed-sequence.ts';
import { fluxConeRays } from '../flux-cone.ts';
import { squareSystem, weightedSum } from '../minors/weighted-sum.ts';
import type { SquareSystem } from '../minors/weighted-sum.ts';
import { asDoubles, massActionSystem, monomial, productionJacobian } from './mass-action-system.ts';
import type { MassActionSystem } from './mass-action-system.ts';
import { polish } from './relax.ts';
import type { VerifiedStates } from './verified-states.ts';
import { exactTotals, shortened, verifyStates } from './verified-states.ts';

/** Points of the search times species squared times arrows; counted, so that a search always ends at the same place. */
const WORK = 12_000_000;
const MOST_POINTS = 1000;
const FEWEST_POINTS = 40;
/** Points of the wrong sign that are followed up. */
const FOLLOWED = 8;
/** Logarithms over which the weights of extreme fluxes and the states are spread, in turn. */
const SPREADS = [6, 3, 9, 1.5] as const;

/**
 * Looks for constants with two positive steady states in one class. Any flux v > 0 in the kernel of N and any x > 0 are a
 * steady state for k = v/x^y (Clarke 1988). Where the determinant of the Jacobian on im N has the sign opposite to that of
 * a stable state, a path to a point of the other sign crosses a degenerate state; just before it a second state of the same
 * class lies close by in the direction that degenerates, and Newton's method finds it (a fold; compare Conradi, Feliu,
 * Mincheva, Wiuf 2017). What is found is proven by interval arithmetic; finding nothing proves nothing.
 */
export function searchPair(context: TheoremContext): VerifiedStates | null {
  const system = massActionSystem(context);
  const square = squareSystem(context);
  if (system === null || square === null || context.consistency?.holds !== true) return null;
  const random = fixedSequence(2718281);
  const unstable = square.rank % 2 === 0 ? -1 : 1;
  const sampler = samplerOf(context, random);
  let right: SteadyPoint = sampler.centre;
  let known = signAt(square, sampler.at(right)) === -unstable;
  const wrong: SteadyPoint[] = [];
  let followed = 0;
  const points = Math.ceil(WORK / context.species.length ** 2 / Math.max(1, context.arrows.length));
  for (let k = 0; k < Math.min(MOST_POINTS, Math.max(FEWEST_POINTS, points)); k++) {
    const point = sampler.next(SPREADS[k % SPREADS.length]!);
    const sign = signAt(square, sampler.at(point));
    if (sign === unstable) wrong.push(point);
    if (sign === -unstable && !known) {
      right = point;
      known = true;
    }
    while (known && wrong.length > 0) {
      const from = right;
      const to = wrong.pop()!;
      const found = nearFold(system, square, unstable, (t) => sampler.at(sampler.between(from, to, t)));
      if (found !== null) return found;
      if (++followed >= FOLLOWED) return null;
    }
  }
  return null;
}

/** A flux in the kernel of N and a state, which is steady for the constants v/x^y. */
interface Candidate {
  readonly flux: readonly number[];
  readonly x: readonly number[];
}

/** Coordinates of a candidate: of the flux (see the sampler) and the logarithms of the state. */
interface SteadyPoint {
  readonly flux: readonly number[];
  readonly state: readonly number[];
}

interface Sampler {
  readonly centre: SteadyPoint;
  next(spread: number): SteadyPoint;
  between(from: SteadyPoint, to: SteadyPoint, t: number): SteadyPoint;
  at(point: SteadyPoint): Candidate;
}

/** Extreme rays kept, and steps of their enumeration. */
const RAY_LIMITS = { rays: 200, steps: 60_000 } as const;

/**
 * Random fluxes: weights of extreme fluxes by their logarithms, which reaches every corner of the cone; where those are
 * too many, fluxes themselves, wandering along the kernel of N.
 */
function samplerOf(context: TheoremContext, random: () => number): Sampler {
  const species = context.species.length;
  const logs = (size: number, spread: number): number[] =>
    Array.from({ length: size }, () => (random() * 2 - 1) * spread);
  const between = (from: SteadyPoint, to: SteadyPoint, t: number): SteadyPoint => ({
    flux: from.flux.map((value, k) => (1 - t) * value + t * to.flux[k]!),
    state: from.state.map((value, i) => (1 - t) * value + t * to.state[i]!),
  });
  const stateOf = (point: SteadyPoint): number[] => point.state.map((value) => elementary.exp(value));
  const rays = fluxConeRays(context, RAY_LIMITS);
  if (rays !== null) {
    const columns = rays.map((ray) => [...ray].map(([arrow, value]) => [arrow, Number(value)] as const));
    return {
      centre: { flux: rays.map(() => 0), state: context.species.map(() => 0) },
      next: (spread) => ({ flux: logs(rays.length, spread), state: logs(species, spread) }),
      between,
      at(point) {
        const flux = context.arrows.map(() => 0);
        columns.forEach((column, r) => {
          const weight = elementary.exp(point.flux[r]!);
          for (const [arrow, value] of column) flux[arrow]! += weight * value;
        });
        return { flux, x: stateOf(point) };
      },
    };
  }
  const directions = context.kernelBasis.map((vector) => vector.map(Number));
  const exact = context.consistency?.holds === true ? context.consistency.flux : [];
  const largest = exact.reduce((most, value) => (value > most ? value : most), 1n);
  let flux: readonly number[] = exact.map((value) => Number(value) / Number(largest));
  return {
    centre: { flux, state: context.species.map(() => 0) },
    next(spread) {
      flux = wander(flux, directions, random);
      return { flux, state: logs(species, spread) };
    },
    between,
    at: (point) => ({ flux: point.flux, x: stateOf(point) }),
  };
}

/** Moves along kernel directions, by preference close to the edge of the cone of positive fluxes. */
function wander(
  flux: readonly number[],
  directions: readonly (readonly number[])[],
  random: () => number,
): number[] {
  let v = [...flux];
  for (const direction of directions) {
    const sense = random() < 0.5 ? 1 : -1;
    let reach = Infinity;
    v.forEach((value, j) => {
      const step = sense * direction[j]!;
      if (step < 0) reach = Math.min(reach, value / -step);
    });
    const room = Math.min(reach, 4);
    const fraction = random() < 0.3 ? 0.98 : random();
    v = v.map((value, j) => value + fraction * room * sense * direction[j]!);
  }
  const largest = Math.max(...v);
  return v.map((value) => Math.max(value / largest, 1e-9));
}

function signAt(square: SquareSystem, { flux, x }: Candidate): number {
  return weightedSum(
    square,
    square.reactions.map((arrow) => flux[arrow]!),
    x.map((value) => 1 / value),
  );
}

/** Halvings of a path on the way to its degenerate point. */
const HALVINGS = 24;
/** How far beyond the degenerate point two states are looked for, as parts of the rest of the path. */
const BEYOND = [0.1, 0.03, 0.3, 0.01] as const;
/** How far along the degenerate direction the second state is looked for, in logarithms. */
const APART = [0.05, 0.1, 0.2, 0.4, 0.8] as const;

/** A verified pair next to a point of a path (right sign at 0, wrong sign at 1) at which the sign turns. */
function nearFold(
  system: MassActionSystem,
  square: SquareSystem,
  unstable: number,
  path: (t: number) => Candidate,
): VerifiedStates | null {
  let low = 0;
  let high = 1;
  for (let k = 0; k < HALVINGS; k++) {
    const middle = (low + high) / 2;
    if (signAt(square, path(middle)) === unstable) high = middle;
    else low = middle;
  }
  for (const part of BEYOND) {
    const states = pairAt(system, path(high + part * (1 - high)));
    if (states !== null) return states;
  }
  return null;
}

/** The state of a candidate and a second one along the direction in which the equations are nearly degenerate. */
function pairAt(system: MassActionSystem, { flux, x }: Candidate): VerifiedStates | null {
  const constants = system.reactions.map((reaction, j) =>
    fromDouble(shortened(flux[j]! / monomial(reaction, x))),
  );
  if (constants.some(({ numerator }) => numerator <= 0n)) return null;
  const numbers = asDoubles(constants);
  const totals = exactTotals(system, x.map(shortened));
  const held = asDoubles(totals);
  const own = polish(system, numbers, x, held);
  const direction = own && weakDirection(system, numbers, own);
  if (direction === null || own === null) return null;
  for (const size of APART) {
    for (const sense of [size, -size]) {
      const start = own.map((value, i) => value * elementary.exp(sense * direction[i]!));
      const other = polish(system, numbers, start, held);
      if (other === null || own.every((value, i) => Math.abs(value - other[i]!) <= 1e-6 * value)) continue;
      const states = verifyStates(system, constants, [own, other], totals);
      if (states !== null && states.boxes.length >= 2) return states;
    }
  }
  return null;
}

/** The relative change of the state that the linearised equations resist least, by inverse iteration; largest entry 1. */
function weakDirection(
  system: MassActionSystem,
  constants: readonly number[],
  x: readonly number[],
): number[] | null {
  const jacobian = productionJacobian(system, constants, x);
  const matrix = [...system.pivotSpecies.map((i) => jacobian[i]!), ...system.lawNumbers].map((row) => {
    const scaled = row.map((entry, i) => entry * x[i]!);
    const largest = scaled.reduce((most, entry) => Math.max(most, Math.abs(entry)), Number.MIN_VALUE);
    return scaled.map((entry) => entry / largest);
  });
  const random = fixedSequence(17);
  // The laws are met exactly, so the direction stays in the class.
  const right = matrix.map((_, row) => (row < system.pivotSpecies.length ? random() - 0.5 : 0));
  const direction = solveDense(matrix, right);
  if (direction === null) return null;
  const largest = direction.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0);
  return largest > 0 && Number.isFinite(largest) ? direction.map((entry) => entry / largest) : null;
}
