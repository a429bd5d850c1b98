import { add, fromDouble, multiply, rational, ZERO } from '../../exact/index.ts';
import type { Rational } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import { fixedSequence } from '../fixed-sequence.ts';
import { oppositeIndices } from '../minors/opposite-minors.ts';
import { squareSystem, weightedSum } from '../minors/weighted-sum.ts';
import type { SquareSystem } from '../minors/weighted-sum.ts';
import { NAUGHT, POSITIVE } from '../signs/domain.ts';
import { kernelVector } from '../signs/sign-vectors.ts';
import { interiorStart } from './interior-start.ts';
import { asDoubles, massActionSystem, monomial, totalsOf } from './mass-action-system.ts';
import type { MassActionSystem } from './mass-action-system.ts';
import { polish, relax } from './relax.ts';
import type { VerifiedStates } from './verified-states.ts';
import { exactTotals, shortened, verifyStates } from './verified-states.ts';

/** Points of the search times species squared times arrows; counted, so that a search always ends at the same place. */
const WORK = 1_500_000;
/** Points at which a wrong sign is followed up by looking for the other states. */
const FOLLOWED = 4;

/**
 * Looks for constants with two positive steady states in one class. Any flux v > 0 in the kernel of N and any x > 0 are a
 * steady state for k = v/x^y; where the determinant of the Jacobian on im N has the sign opposite to that of a stable
 * state, other states of the class are looked for by following the rate equations from nearby. What is found is proven by
 * interval arithmetic; finding nothing proves nothing.
 */
export function searchPair(context: TheoremContext): VerifiedStates | null {
  const system = massActionSystem(context);
  const square = squareSystem(context);
  const consistency = context.consistency;
  if (system === null || square === null || consistency?.holds !== true) return null;
  const random = fixedSequence(2718281);
  const unstable = square.rank % 2 === 0 ? -1 : 1;
  let followed = 0;
  const largest = consistency.flux.reduce((most, value) => (value > most ? value : most), 1n);
  const positive = consistency.flux.map((value) => Number(value) / Number(largest));
  for (const { flux, x } of candidates(context, positive, unstable, random)) {
    if (signAt(square, flux, x) !== unstable) continue;
    const found = followUp(system, flux, x, random);
    if (found !== null) return found;
    if (++followed >= FOLLOWED) return null;
  }
  return null;
}

interface Candidate {
  readonly flux: readonly number[];
  readonly x: readonly number[];
}

/** First points at which one product of the wrong sign outweighs the others, then random ones. */
function* candidates(
  context: TheoremContext,
  positive: readonly number[],
  unstable: number,
  random: () => number,
): Generator<Candidate> {
  const opposite = oppositeIndices(context);
  const wanted = unstable > 0 ? opposite?.positive : opposite?.negative;
  const directed = wanted === undefined ? null : fluxThrough(context, wanted.arrows);
  if (wanted !== undefined && directed !== null) {
    const inside = new Set(wanted.species);
    for (const [rest, scale] of [
      [1e-2, 16],
      [1e-3, 64],
      [1e-1, 4],
      [1e-4, 256],
    ] as const) {
      yield {
        flux: directed.map((value, j) => value + rest * positive[j]!),
        x: context.species.map((_, i) => (inside.has(i) ? 1 / scale : 1)),
      };
    }
  }
  const directions = context.kernelBasis.map((vector) => vector.map(Number));
  const tries = Math.min(
    3000,
    Math.ceil(WORK / context.species.length ** 2 / Math.max(1, context.arrows.length)),
  );
  let flux: readonly number[] = positive;
  for (let k = 0; k < tries; k++) {
    flux = wander(flux, directions, random);
    const spread = 2 + (k % 5) * 2;
    yield { flux, x: context.species.map(() => 2 ** Math.round((random() * 2 - 1) * spread)) };
  }
}

/** A flux in the kernel of N, not negative, of size at least 1 on the given arrows and small elsewhere. */
function fluxThrough(context: TheoremContext, arrows: readonly number[]): number[] | null {
  const wanted = new Set(arrows);
  const signs = context.arrows.map((_, arrow) => (wanted.has(arrow) ? POSITIVE : POSITIVE | NAUGHT));
  const flux = kernelVector(context, signs);
  if (flux === null || flux === 'unfinished') return null;
  const least = arrows.reduce((least, arrow) => Math.min(least, Number(flux[arrow]!)), Infinity);
  return flux.map((value) => Number(value) / least);
}

/** Looks for two states for given constants in the class of a given start. */
export function pairForConstants(
  context: TheoremContext,
  constants: readonly Rational[],
  start: readonly Rational[],
): VerifiedStates | null {
  const system = massActionSystem(context);
  if (system === null) return null;
  const inside = interiorStart(context, asDoubles(start));
  if (inside === null) return null;
  const totals = system.laws.map((law) => exactSum(law, start));
  const found = otherStates(system, asDoubles(constants), [inside], fixedSequence(31));
  const states = verifyStates(system, constants, found, totals);
  return states !== null && states.boxes.length >= 2 ? states : null;
}

function followUp(
  system: MassActionSystem,
  flux: readonly number[],
  x: readonly number[],
  random: () => number,
): VerifiedStates | null {
  const constants = system.reactions.map((reaction, j) =>
    fromDouble(shortened(flux[j]! / monomial(reaction, x))),
  );
  if (constants.some(({ numerator }) => numerator <= 0n)) return null;
  const states = verifyStates(
    system,
    constants,
    otherStates(system, asDoubles(constants), [x], random),
    exactTotals(system, x),
  );
  return states !== null && states.boxes.length >= 2 ? states : null;
}

/** Descents from around each start. */
const DESCENTS = 10;
/** States of one class after which no further ones are looked for by descents. */
const ENOUGH = 4;
/** Points between two states from which Newton's method looks for an unstable one. */
const BETWEEN = [0.5, 0.1, 0.9, 0.25, 0.75, 0.02, 0.98, 0.05, 0.95];

/** Steady states of one class reached from around given states, nearly equal ones once; unstable ones from between them. */
function otherStates(
  system: MassActionSystem,
  constants: readonly number[],
  starts: readonly (readonly number[])[],
  random: () => number,
): number[][] {
  const found: number[][] = [];
  const keep = (state: readonly number[] | null): void => {
    if (state === null) return;
    const known = found.some((other) =>
      other.every((value, i) => Math.abs(value - state[i]!) <= 1e-7 * value),
    );
    if (!known) found.push([...state]);
  };
  for (const start of starts) {
    const totals = totalsOf(system, start);
    keep(polish(system, constants, start, totals));
    for (let k = 0; k < DESCENTS && found.length < ENOUGH; k++)
      keep(relax(system, constants, displaced(system, start, k, random)));
    const stable = [...found];
    stable.forEach((a, i) => {
      for (const b of stable.slice(i + 1)) {
        for (const t of BETWEEN) keep(polish(system, constants, mixed(a, b, t), totals));
        keep(polish(system, constants, geometricMean(a, b), totals));
      }
    });
  }
  return found;
}

function mixed(a: readonly number[], b: readonly number[], t: number): number[] {
  return a.map((value, i) => (1 - t) * value + t * b[i]!);
}

function geometricMean(a: readonly number[], b: readonly number[]): number[] {
  return a.map((value, i) => Math.sqrt(value * b[i]!));
}

/** A positive state of the same class, some way off along a random combination of reaction vectors. */
function displaced(
  system: MassActionSystem,
  x: readonly number[],
  turn: number,
  random: () => number,
): number[] {
  const sense = turn % 2 === 0 ? 1 : -1;
  const move = x.map(() => 0);
  for (const { change } of system.reactions) {
    const weight = sense * (random() - 0.3);
    for (const { species, amount } of change) move[species]! += weight * amount;
  }
  let reach = Infinity;
  x.forEach((value, i) => {
    if (move[i]! < 0) reach = Math.min(reach, value / -move[i]!);
  });
  const fraction = [0.1, 0.9, 0.5, 0.99][Math.floor(turn / 2) % 4]!;
  // Without a boundary ahead the way is measured by the state itself.
  const step = Number.isFinite(reach) ? reach * fraction : 10 * fraction * fraction * (1 + Math.max(...x));
  return x.map((value, i) => value + step * move[i]!);
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

function signAt(square: SquareSystem, flux: readonly number[], x: readonly number[]): number {
  return weightedSum(
    square,
    square.reactions.map((arrow) => flux[arrow]!),
    x.map((value) => 1 / value),
  );
}

function exactSum(law: readonly bigint[], x: readonly Rational[]): Rational {
  return law.reduce(
    (sum, weight, i) => (weight === 0n ? sum : add(sum, multiply(rational(weight), x[i]!))),
    ZERO,
  );
}
