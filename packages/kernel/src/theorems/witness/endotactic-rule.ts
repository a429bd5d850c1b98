import type { Rational } from '../../exact/index.ts';
import { clearDenominators, solveLinear, subtract, ZERO } from '../../exact/index.ts';
import type { LinearCondition } from '../../exact/index.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';
import type { PlainNetwork } from './plain-network.ts';

/** Reactant complexes squared times species above which cones are not looked at. */
const LARGEST = 40_000;

/**
 * Strongly endotactic, by the dual statements: no reaction leads outwards exactly when its change lies in the cone of the
 * differences z − y to other reactants; and where reactions of an outermost y run along the face, what this forces onto the
 * face is what has its opposite in the cone of y − z and the lines of those reactions, until every reaction lies in its lines.
 */
export function stronglyEndotactic({ plain, holds }: Evidence): Finding {
  if (!holds) return 'it is never said to fail.';
  const reactants = [...new Set(plain.reactions.map(({ from }) => from))];
  if (reactants.length ** 2 * plain.species.length > LARGEST)
    return new Unconfirmed('there are too many complexes to look at all directions.');
  const towards = (from: number, to: number): Rational[] =>
    plain.species.map((name) =>
      subtract(plain.complexes[to]!.get(name) ?? ZERO, plain.complexes[from]!.get(name) ?? ZERO),
    );
  for (const { from, to } of plain.reactions) {
    const rays = reactants.map((other) => towards(from, other));
    if (!inCone(towards(from, to), rays, [])) return 'a reaction leads outwards.';
  }
  for (const start of reactants) {
    if (!facesLeft(plain, start, reactants, towards)) return 'no reaction leads inwards in some direction.';
  }
  return null;
}

function facesLeft(
  plain: PlainNetwork,
  start: number,
  reactants: readonly number[],
  towards: (from: number, to: number) => Rational[],
): boolean {
  let face = new Set([start]);
  for (;;) {
    const rays = reactants.filter((other) => !face.has(other)).map((other) => towards(other, start));
    const lines = [
      ...[...face].map((other) => towards(start, other)),
      ...plain.reactions.filter(({ from }) => face.has(from)).map(({ from, to }) => towards(from, to)),
    ];
    const forced = reactants.filter(
      (other) => !face.has(other) && inCone(towards(start, other), rays, lines),
    );
    if (forced.length === 0) {
      return plain.reactions.every(
        ({ from, to }) => inCone(towards(from, to), rays, lines) && inCone(towards(to, from), rays, lines),
      );
    }
    face = new Set([...face, ...forced]);
  }
}

/** Whether a vector is a non-negative combination of rays and any combination of lines. */
function inCone(
  target: readonly Rational[],
  rays: readonly (readonly Rational[])[],
  lines: readonly (readonly Rational[])[],
): boolean {
  const columns = [...rays, ...lines];
  const conditions = target.map((value, i): LinearCondition => {
    const { integers } = clearDenominators([...columns.map((column) => column[i]!), value]);
    return {
      terms: columns.flatMap((_, k) => (integers[k] === 0n ? [] : [[k, integers[k]!] as const])),
      relation: '=',
      right: integers.at(-1)!,
    };
  });
  const outcome = solveLinear({
    variables: columns.length,
    free: (k) => k >= rays.length,
    conditions,
  });
  if (outcome.kind === 'unfinished') throw new Error('a linear programme was too long');
  return outcome.kind === 'feasible';
}
