import type { LinearCondition, Rational } from '../../exact/index.ts';
import { clearDenominators, solveLinear } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';

/** What the mean change of a positive linear function has to satisfy. */
export type DriftKind = 'bounded growth' | 'inward';

/** A positive linear function of the species, and whether it works for all constants or for those of the text. */
export interface LinearDrift {
  readonly weights: readonly bigint[];
  readonly scope: 'all constants' | 'these constants';
}

/** Species times arrows above which no function is looked for. */
const LARGEST = 60_000;

/**
 * Looks for w ≥ 1 with, in counts, (Qg)(x) = Σ λ_j(x) w·ν_j for g = w·x bounded by c + d g ("bounded growth": reactant
 * complexes of two or more molecules do not raise g), or tending to −∞ with |x| ("inward": besides, no complex raises g,
 * and for every species the complexes made of it alone lower g). For all constants each arrow has to comply, for given
 * ones the sum over the arrows of a reactant complex. Exact linear programming; Meyn, Tweedie 1993; Gupta, Briat,
 * Khammash 2014. Null where there is none or the network is too large; that proves nothing.
 */
export function linearDrift(context: TheoremContext, kind: DriftKind): LinearDrift | null {
  if (!context.dense || context.species.length * context.arrows.length > LARGEST) return null;
  const structural = solved(context, kind, null);
  if (structural !== null) return { weights: structural, scope: 'all constants' };
  const constants = context.exactConstants;
  const given = constants && solved(context, kind, constants);
  return given && { weights: given, scope: 'these constants' };
}

function solved(
  context: TheoremContext,
  kind: DriftKind,
  constants: readonly Rational[] | null,
): bigint[] | null {
  const conditions: LinearCondition[] = [];
  const lowered = context.species.map(() => new Map<number, bigint>());
  for (const [complex, arrows] of arrowsByReactant(context)) {
    const terms = context.terms(complex);
    const size = terms.reduce((sum, { coefficient }) => sum + coefficient, 0);
    const drifts =
      constants === null
        ? arrows.map((arrow) => changeOf(context, arrow))
        : [meanChange(context, arrows, constants)];
    for (const drift of drifts) {
      if (kind === 'inward' ? size > 0 : size > 1) conditions.push(notRaised(drift));
      if (terms.length === 1) for (const [i, value] of drift) add(lowered[terms[0]!.species]!, i, value);
    }
  }
  if (kind === 'inward') {
    for (const drift of lowered) {
      if (drift.size === 0) return null;
      conditions.push({
        terms: [...drift].map(([i, value]) => [i, -value] as const),
        relation: '>=',
        right: 1n,
      });
    }
  }
  // Unknowns u ≥ 0 with w = 1 + u.
  const moved = conditions.map(({ terms, relation, right }) => ({
    terms,
    relation,
    right: terms.reduce((rest, [, coefficient]) => rest - coefficient, right),
  }));
  const outcome = solveLinear({ variables: context.species.length, conditions: moved });
  return outcome.kind === 'feasible' ? outcome.values.map((value) => value + outcome.denominator) : null;
}

function arrowsByReactant(context: TheoremContext): Map<number, number[]> {
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

function notRaised(drift: ReadonlyMap<number, bigint>): LinearCondition {
  return { terms: [...drift].map(([i, value]) => [i, -value] as const), relation: '>=', right: 0n };
}
