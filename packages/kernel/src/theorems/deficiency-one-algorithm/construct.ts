import { elementary } from '@stillroom/shared/expression';
import type { LinearCondition } from '../../exact/index.ts';
import { solveLinear } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import { monomial } from '../steady-states/mass-action-system.ts';
import type { AlgorithmOutcome } from './decide.ts';
import { regularNetwork } from './regular.ts';

/** Constants by arrow in doubles and two positive steady states of one class for them, up to rounding. */
export interface ConstructedPair {
  readonly constants: readonly number[];
  readonly states: readonly [readonly number[], readonly number[]];
}

/**
 * Turns a solution of the deficiency one algorithm into constants with two steady states: x* = σ/(e^μ − 1), x** = x* e^μ,
 * fluxes at x* from a flux that realises g and, on the pairs of terminal classes, from the two ways in which they carry
 * the net flow at x* and at x** (Feinberg 1988). `size` scales μ, which may be chosen freely. Null where the solution has
 * species of fractional units.
 */
export function constructPair(
  context: TheoremContext,
  outcome: Extract<AlgorithmOutcome, { kind: 'several' }>,
  size: number,
): ConstructedPair | null {
  const regular = regularNetwork(context);
  const flow = realisedFlow(context, outcome.g);
  if (typeof regular === 'string' || flow === null || !context.whole) return null;
  const largest = [...outcome.mu, outcome.level].reduce(
    (most, value) => Math.max(most, Math.abs(Number(value))),
    1,
  );
  const mu = outcome.mu.map((value) => (Number(value) * size) / largest);
  const rho = elementary.exp((Number(outcome.level) * size) / largest);
  const steepest = outcome.sigma.reduce((most, value) => Math.max(most, Math.abs(Number(value))), 1);
  const low = mu.map((value, i) =>
    value === 0 ? 1 : Number(outcome.sigma[i]!) / steepest / (elementary.exp(value) - 1),
  );
  const high = low.map((value, i) => value * elementary.exp(mu[i]!));
  const level = (complex: number): number =>
    context.terms(complex).reduce((sum, { species, coefficient }) => sum + coefficient * mu[species]!, 0);
  const fluxes = context.arrows.map(({ from, to }, arrow) => {
    const net = flow.pairs.get(`${from} ${to}`);
    if (net === undefined) return flow.fluxes[arrow]!;
    const a = elementary.exp(level(from)) - rho;
    const b = elementary.exp(level(to)) - rho;
    // Both ends on one level: any two fluxes with this difference will do.
    return a === b ? Math.max(net, 0) + Math.abs(net) + 1 : (net * b) / (b - a);
  });
  const constants = context.arrows.map(({ from }, arrow) => {
    const reactants = context
      .terms(from)
      .map(({ species, coefficient }) => ({ species, exponent: coefficient }));
    return fluxes[arrow]! / monomial({ reactants }, low);
  });
  if (constants.some((value) => !(value > 0) || !Number.isFinite(value))) return null;
  return { constants, states: [low, high] };
}

interface RealisedFlow {
  /** By arrow; only those that leave non-terminal complexes are meant. */
  readonly fluxes: readonly number[];
  /** Net flow by "from to" for the arrows inside terminal classes. */
  readonly pairs: ReadonlyMap<string, number>;
}

/** v ≥ 1 on arrows out of non-terminal complexes and net flows on terminal pairs with I_a v = α g, α ≥ 1. */
function realisedFlow(context: TheoremContext, g: readonly bigint[]): RealisedFlow | null {
  const nonterminal = new Set(context.nonterminalComplexes);
  const unknowns = context.arrows.map((_, arrow) => arrow);
  const factor = unknowns.length;
  const counted = unknowns.filter((arrow) => {
    const { from } = context.arrows[arrow]!;
    const reverse = context.structure.arrows.reverse[arrow]!;
    return nonterminal.has(from) || reverse < 0 || reverse > arrow;
  });
  const balances: Map<number, bigint>[] = Array.from({ length: context.complexCount }, () => new Map());
  for (const arrow of counted) {
    const { from, to } = context.arrows[arrow]!;
    balances[to]!.set(arrow, 1n);
    balances[from]!.set(arrow, -1n);
  }
  const conditions: LinearCondition[] = balances.map((terms, complex) => ({
    terms: [...terms, [factor, -g[complex]!] as const],
    relation: '=',
    right: 0n,
  }));
  for (const arrow of counted) {
    if (nonterminal.has(context.arrows[arrow]!.from))
      conditions.push({ terms: [[arrow, 1n]], relation: '>=', right: 1n });
  }
  conditions.push({ terms: [[factor, 1n]], relation: '>=', right: 1n });
  const outcome = solveLinear({
    variables: factor + 1,
    free: (k) => k < factor && !nonterminal.has(context.arrows[k]!.from),
    conditions,
  });
  if (outcome.kind !== 'feasible') return null;
  const value = (k: number): number => Number(outcome.values[k]!) / Number(outcome.denominator);
  const pairs = new Map<string, number>();
  for (const arrow of counted) {
    const { from, to } = context.arrows[arrow]!;
    if (nonterminal.has(from)) continue;
    pairs.set(`${from} ${to}`, value(arrow));
    pairs.set(`${to} ${from}`, -value(arrow));
  }
  return { fluxes: unknowns.map(value), pairs };
}
