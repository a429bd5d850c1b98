import type { LinearCondition, Rational } from '../../exact/index.ts';
import { clearDenominators, solveLinear } from '../../exact/index.ts';
import type { Term } from '../coefficients.ts';
import type { TheoremContext } from '../context.ts';

/** What the mean change of a positive linear function has to satisfy. */
export type DriftKind = 'bounded growth' | 'inward';

/**
 * A linear function, positive on every species that no law bounds and 0 on the others, and whether it works for all
 * constants or for those of the text.
 */
export interface LinearDrift {
  readonly weights: readonly bigint[];
  /** "with positive coefficients", or the same for the species that no law bounds. */
  readonly words: string;
  readonly scope: 'all constants' | 'these constants';
}

/** Species times arrows above which no function is looked for. */
export const LARGEST = 60_000;

/**
 * Looks for w ≥ 1 with, in counts, (Qg)(x) = Σ λ_j(x) w·ν_j for g = w·x bounded by c + d g ("bounded growth": reactant
 * complexes of two or more molecules do not raise g), or tending to −∞ with |x| ("inward": for every species i some
 * complex n_i X_i of it alone lowers g, and a complex y that raises g has Σ y_i/n_i < 1, so that its term x^y is outgrown by
 * the terms x_i^{n_i}: the inequality of weighted means). For all constants each arrow has to comply, for given
 * ones the sum over the arrows of a reactant complex. Species in the support of a non-negative law are bounded on every
 * class: they are left out of g and of the sizes of complexes. Exact linear programming; Meyn, Tweedie 1993; Gupta, Briat,
 * Khammash 2014. Null where there is none or the network is too large; that proves nothing.
 */
export function linearDrift(context: TheoremContext, kind: DriftKind): LinearDrift | null {
  return context.memo(`linear drift ${kind}`, () => {
    if (!context.dense || context.species.length * context.arrows.length > LARGEST) return null;
    const free = freeSpecies(context);
    const words = weightWords(free);
    const structural = solved(context, free, kind, null);
    if (structural !== null) return { weights: structural, words, scope: 'all constants' };
    const constants = context.exactConstants;
    const given = constants && solved(context, free, kind, constants);
    return given && { weights: given, words, scope: 'these constants' };
  });
}

/** Which species a function is positive on, in words. */
export function weightWords(free: readonly boolean[]): string {
  return free.every(Boolean)
    ? 'with positive coefficients'
    : 'with positive coefficients on the species that no conservation law bounds';
}

/** Species outside the support of every non-negative law; all of them where laws bound everything. */
export function freeSpecies(context: TheoremContext): boolean[] {
  const free = context.species.map(() => true);
  for (const { indices } of context.analysis.laws?.nonnegative ?? [])
    for (const species of indices) free[species] = false;
  return free.includes(true) ? free : free.map(() => true);
}

function solved(
  context: TheoremContext,
  free: readonly boolean[],
  kind: DriftKind,
  constants: readonly Rational[] | null,
): bigint[] | null {
  const found = (
    held: (reactants: Reactants) => boolean,
    powers: readonly number[] | null,
  ): bigint[] | null => feasible(free, driftConditions(context, free, constants, held, powers));
  if (kind === 'bounded growth') return found(({ size }) => size > 1, []);
  const powers = highestPowers(context, free);
  if (powers === null) return null;
  // The highest powers of each species outgrow what lies below them; or some power does, and nothing is raised.
  return found(({ terms }) => !isOutgrown(terms, powers), powers) ?? found(({ size }) => size > 0, null);
}

/** Whether Σ y_i/n_i < 1 for the free species of a complex. */
export function isOutgrown(terms: readonly Term[], powers: readonly number[]): boolean {
  return (
    terms.reduce((sum, { species, coefficient }) => sum + coefficient / powers[species]!, 0) < 1 - ROUNDING
  );
}

/** Sums of quotients of whole numbers are exact to far less than this. */
const ROUNDING = 1e-9;

/** The free species of a reactant complex. */
interface Reactants {
  readonly terms: readonly Term[];
  readonly size: number;
}

/** For each free species the highest n for which n of it alone is a reactant complex; null where some species has none. */
export function highestPowers(context: TheoremContext, free: readonly boolean[]): number[] | null {
  const powers = context.species.map(() => 0);
  for (const complex of arrowsByReactant(context).keys()) {
    const [first, ...others] = context.terms(complex);
    if (first !== undefined && others.length === 0)
      powers[first.species] = Math.max(powers[first.species]!, first.coefficient);
  }
  return powers.every((power, i) => power > 0 || !free[i]) ? powers : null;
}

/**
 * Conditions on w: complexes that are `held` do not raise g, and for every free species the complex of the given power lowers
 * it (null: some complex of the species alone does). No powers, no such condition.
 */
function driftConditions(
  context: TheoremContext,
  free: readonly boolean[],
  constants: readonly Rational[] | null,
  held: (reactants: Reactants) => boolean,
  powers: readonly number[] | null,
): LinearCondition[] {
  const conditions: LinearCondition[] = [];
  const lowered = context.species.map(() => new Map<number, bigint>());
  for (const [complex, arrows] of arrowsByReactant(context)) {
    const all = context.terms(complex);
    const terms = all.filter(({ species }) => free[species]);
    const size = terms.reduce((sum, { coefficient }) => sum + coefficient, 0);
    const drifts =
      constants === null
        ? arrows.map((arrow) => changeOf(context, arrow))
        : [meanChange(context, arrows, constants)];
    const [first] = terms;
    const alone = first !== undefined && all.length === 1;
    const pivot = alone && (powers === null || powers[first.species] === first.coefficient);
    for (const whole of drifts) {
      const drift = new Map([...whole].filter(([species]) => free[species]));
      if (held({ terms, size })) conditions.push(notRaised(drift));
      if (pivot) for (const [i, value] of drift) add(lowered[first.species]!, i, value);
    }
  }
  if (powers?.length === 0) return conditions;
  for (const [species, drift] of lowered.entries()) {
    if (!free[species]) continue;
    conditions.push({
      terms: [...drift].map(([i, value]) => [i, -value] as const),
      relation: '>=',
      right: 1n,
    });
  }
  return conditions;
}

/** w that meets the conditions, ≥ 1 on free species: unknowns u ≥ 0 with w = 1 + u; 0 on the others. */
function feasible(free: readonly boolean[], conditions: readonly LinearCondition[]): bigint[] | null {
  const moved = conditions.map(({ terms, relation, right }) => ({
    terms,
    relation,
    right: terms.reduce((rest, [, coefficient]) => rest - coefficient, right),
  }));
  const outcome = solveLinear({ variables: free.length, conditions: moved });
  if (outcome.kind !== 'feasible') return null;
  return outcome.values.map((value, i) => (free[i] ? value + outcome.denominator : 0n));
}

/** The arrows that leave each reactant complex. */
export function arrowsByReactant(context: TheoremContext): Map<number, number[]> {
  const groups = new Map<number, number[]>();
  context.arrows.forEach(({ from }, arrow) => {
    const list = groups.get(from);
    if (list) list.push(arrow);
    else groups.set(from, [arrow]);
  });
  return groups;
}

function changeOf(context: TheoremContext, arrow: number): Map<number, bigint> {
  const { from, to } = context.arrows[arrow]!;
  return context.coefficients.change(from, to);
}

/** Σ k_j ν_j over the arrows, up to a positive factor. */
function meanChange(
  context: TheoremContext,
  arrows: readonly number[],
  constants: readonly Rational[],
): Map<number, bigint> {
  const { integers } = clearDenominators(arrows.map((arrow) => constants[arrow]!));
  const mean = new Map<number, bigint>();
  arrows.forEach((arrow, k) =>
    changeOf(context, arrow).forEach((value, i) => add(mean, i, value * integers[k]!)),
  );
  return mean;
}

function add(sum: Map<number, bigint>, species: number, value: bigint): void {
  sum.set(species, (sum.get(species) ?? 0n) + value);
}

/** The function does not rise along a change. */
export function notRaised(drift: ReadonlyMap<number, bigint>): LinearCondition {
  return { terms: [...drift].map(([i, value]) => [i, -value] as const), relation: '>=', right: 0n };
}
