import type { LinearCondition } from '../../exact/index.ts';
import { solveLinear } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';

/**
 * - `yes`: in every direction that is not orthogonal to all reactions, no reaction leaves the outermost reactants
 *   outwards, and one leaves them inwards.
 * - `no`: `direction` (a linear function of the species) breaks this: an outermost reactant has a reaction outwards
 *   (`arrow`), or all reactions of outermost reactants run along the face although others do not (`arrow` is null).
 * - `open`: too large for the exact programmes.
 */
export type Endotacticity =
  | { readonly kind: 'yes' }
  | { readonly kind: 'no'; readonly direction: readonly bigint[]; readonly arrow: number | null }
  | { readonly kind: 'open' };

/** Reactant complexes squared times species times arrows above which the programmes are not started. */
const LARGEST = 6_000_000;
/** Pivots of one programme. */
const PIVOTS = 1_500;

/**
 * Decides exactly whether a network is strongly endotactic (Gopalkrishnan, Miller, Shiu 2014). For a direction w let F be
 * the reactants at which w is largest. Reactions outwards are looked for arrow by arrow: y in F with w·(y' − y) > 0. For
 * the second part the reactants of F that some y forces (all reactions of F orthogonal to w) are gathered until none is
 * added; the cone of such w is convex, so its relative interior has exactly these, and one linear programme after another
 * decides. Polynomially many programmes, no enumeration of directions.
 */
export function endotacticity(context: TheoremContext): Endotacticity {
  return context.memo('endotacticity', () => decide(context));
}

interface Geometry {
  readonly context: TheoremContext;
  /** Complexes that react, and the arrows that leave each. */
  readonly reactants: readonly number[];
  readonly leaving: ReadonlyMap<number, readonly number[]>;
}

class Unfinished extends Error {}

function decide(context: TheoremContext): Endotacticity {
  if (!context.dense) return { kind: 'open' };
  const leaving = new Map<number, number[]>();
  context.arrows.forEach(({ from }, arrow) => leaving.set(from, [...(leaving.get(from) ?? []), arrow]));
  const reactants = [...leaving.keys()];
  if (reactants.length ** 2 * context.species.length * Math.max(1, context.arrows.length) > LARGEST)
    return { kind: 'open' };
  const geometry: Geometry = { context, reactants, leaving };
  try {
    return outwards(geometry) ?? along(geometry) ?? { kind: 'yes' };
  } catch (error) {
    if (error instanceof Unfinished) return { kind: 'open' };
    throw error;
  }
}

/** A reaction that leaves an outermost reactant outwards; none can where the product is itself a reactant. */
function outwards(geometry: Geometry): Endotacticity | null {
  const { context, reactants, leaving } = geometry;
  for (const [arrow, { from, to }] of context.arrows.entries()) {
    if (leaving.has(to)) continue;
    const conditions = reactants
      .filter((other) => other !== from)
      .map((other) => above(context, from, other, 0n));
    conditions.push(atLeast(context.coefficients.change(from, to), 1n));
    const direction = solved(context, conditions);
    if (direction !== null) return { kind: 'no', direction: context.coefficients.unscale(direction), arrow };
  }
  return null;
}

/** A direction in which all reactions of the outermost reactants run along their face and some other reaction does not. */
function along(geometry: Geometry): Endotacticity | null {
  const { context, reactants } = geometry;
  const done = new Set<string>();
  for (const start of reactants) {
    const first = joined(geometry, [start]);
    const key = [...first].sort((a, b) => a - b).join();
    if (done.has(key)) continue;
    done.add(key);
    const direction = violation(geometry, start, first);
    if (direction !== null)
      return { kind: 'no', direction: context.coefficients.unscale(direction), arrow: null };
  }
  return null;
}

/** With a reactant its products lie on the face, since its reactions run along it; so do theirs where they react. */
function joined({ context, leaving }: Geometry, start: Iterable<number>): Set<number> {
  const face = new Set(start);
  for (const complex of face) {
    for (const arrow of leaving.get(complex)!) {
      const { to } = context.arrows[arrow]!;
      if (leaving.has(to)) face.add(to);
    }
  }
  return face;
}

function violation(geometry: Geometry, start: number, first: ReadonlySet<number>): bigint[] | null {
  const { context, reactants, leaving } = geometry;
  let face = new Set(first);
  for (;;) {
    const onFace = [...face].flatMap((complex) => [
      level(context, start, complex),
      ...leaving.get(complex)!.map((arrow) => still(context, arrow)),
    ]);
    const others = reactants.filter((complex) => !face.has(complex));
    if (others.length === 0) return null;
    const cone = [...onFace, ...others.map((other) => above(context, start, other, 0n))];
    let pending = others;
    let direction = context.species.map(() => 0n);
    while (pending.length > 0) {
      const further = solved(context, [...cone, sumAbove(context, start, pending)]);
      if (further === null) break;
      direction = direction.map((value, i) => value + further[i]!);
      pending = pending.filter((other) => height(context, further, start, other) <= 0n);
    }
    if (pending.length === 0) return moving(geometry, cone, direction, others);
    face = joined(geometry, [...face, ...pending]);
  }
}

/** The direction, changed within its cone until some reaction is not orthogonal to it; null where none can be. */
function moving(
  { context, leaving }: Geometry,
  cone: readonly LinearCondition[],
  direction: readonly bigint[],
  others: readonly number[],
): bigint[] | null {
  const outside = others.flatMap((complex) => leaving.get(complex)!);
  const changes = outside.map((arrow) => changeOf(context, arrow));
  if (changes.some((change) => paired(change, direction) !== 0n)) return [...direction];
  for (const change of changes) {
    for (const sense of [1n, -1n]) {
      const further = solved(context, [...cone, atLeast(change, sense)]);
      if (further !== null) return direction.map((value, i) => value + further[i]!);
    }
  }
  return null;
}

function solved(context: TheoremContext, conditions: readonly LinearCondition[]): bigint[] | null {
  const outcome = solveLinear({ variables: context.species.length, free: () => true, conditions }, PIVOTS);
  if (outcome.kind === 'unfinished') throw new Unfinished();
  return outcome.kind === 'feasible' ? outcome.values : null;
}

function changeOf(context: TheoremContext, arrow: number): ReadonlyMap<number, bigint> {
  const { from, to } = context.arrows[arrow]!;
  return context.coefficients.change(from, to);
}

function paired(change: ReadonlyMap<number, bigint>, direction: readonly bigint[]): bigint {
  let sum = 0n;
  for (const [i, amount] of change) sum += amount * direction[i]!;
  return sum;
}

/** w·(high − low). */
function height(context: TheoremContext, direction: readonly bigint[], high: number, low: number): bigint {
  return paired(context.coefficients.change(low, high), direction);
}

/** w·(high − low) ≥ least. */
function above(context: TheoremContext, high: number, low: number, least: bigint): LinearCondition {
  return { terms: [...context.coefficients.change(low, high)], relation: '>=', right: least };
}

/** w·a = w·b. */
function level(context: TheoremContext, a: number, b: number): LinearCondition {
  return { terms: [...context.coefficients.change(a, b)], relation: '=', right: 0n };
}

/** w is orthogonal to a reaction. */
function still(context: TheoremContext, arrow: number): LinearCondition {
  return { terms: [...changeOf(context, arrow)], relation: '=', right: 0n };
}

/** sense · w·change ≥ 1. */
function atLeast(change: ReadonlyMap<number, bigint>, sense: bigint): LinearCondition {
  return { terms: [...change].map(([i, amount]) => [i, amount * sense] as const), relation: '>=', right: 1n };
}

/** Σ w·(high − low) ≥ 1 over several low ones: at least one of them is truly lower. */
function sumAbove(context: TheoremContext, high: number, lows: readonly number[]): LinearCondition {
  const sum = new Map<number, bigint>();
  for (const low of lows) {
    for (const [i, amount] of context.coefficients.change(low, high)) sum.set(i, (sum.get(i) ?? 0n) + amount);
  }
  return { terms: [...sum], relation: '>=', right: 1n };
}
