import { add, multiply, rational, ZERO } from '../../exact/index.ts';
import type { Rational } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import { fixedSequence } from '../fixed-sequence.ts';
import { interiorStart } from './interior-start.ts';
import { asDoubles, massActionSystem, totalsOf } from './mass-action-system.ts';
import type { MassActionSystem } from './mass-action-system.ts';
import { polish, relax } from './relax.ts';
import type { VerifiedStates } from './verified-states.ts';
import { verifyStates } from './verified-states.ts';

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

function exactSum(law: readonly bigint[], x: readonly Rational[]): Rational {
  return law.reduce(
    (sum, weight, i) => (weight === 0n ? sum : add(sum, multiply(rational(weight), x[i]!))),
    ZERO,
  );
}
