import type { BalanceCycle, BalanceResult, VerdictId } from '@stillroom/shared/cells';
import type { Network, Quantity } from '@stillroom/shared/network';
import type { ComplexCondition, DetailedCondition, ReversiblePair } from '../balance/index.ts';
import {
  balancedLogarithms,
  balancedStateOfClass,
  complexConditions,
  complexResidual,
  detailedConditions,
  doublesOf,
  entropyProductionOf,
  fluxesAt,
  lnOfRational,
  namedShares,
  nearestConstants,
  reversiblePairs,
  treeConstants,
} from '../balance/index.ts';
import type { Rational } from '../exact/index.ts';
import { formatRational, parseRational, rational, toDouble } from '../exact/index.ts';
import { resolveValues } from '../rates/index.ts';
import type { TheoremContext } from '../theorems/context.ts';
import { contextOf } from '../theorems/index.ts';
import { interiorStart } from '../theorems/steady-states/interior-start.ts';
import { massActionSystem } from '../theorems/steady-states/mass-action-system.ts';
import { relax } from '../theorems/steady-states/relax.ts';
import { resultUnits } from './units.ts';

/** Verdicts that a balance cell shows. */
const SHOWN: readonly VerdictId[] = ['complex-balance', 'detailed-balance', 'global-stability'];
/** Complexes above which tree constants are not listed. */
const LISTED = 200;

/**
 * The result of a balance cell: the exact conditions on the constants for complex and for detailed balance, whether they
 * hold, the balanced state of the class of the start, and the nearest balanced constants. `constants` replace those of the
 * text; throws RateError for a name the network does not have.
 */
export function analyseBalance(
  network: Network,
  constants: Readonly<Record<string, number>> = {},
): BalanceResult {
  const context = contextOf(withConstants(network, constants));
  const complex = context.verdict('complex-balance');
  const detailed = context.verdict('detailed-balance');
  const undecided = [complex, detailed].find(({ applies }) => applies === 'undecided');
  const conditions = context.kinetics.otherLaw === null ? complexConditions(context) : null;
  const circuits = context.kinetics.otherLaw === null ? detailedConditions(context) : null;
  const { zero, why } = context.constants;
  const answer = { yes: true, no: false, undecided: null } as const;
  return {
    complexBalanced: zero ? null : answer[complex.applies],
    detailedBalanced: zero ? null : answer[detailed.applies],
    ...(zero
      ? { why: `${why}: balance needs positive constants. Leave that arrow out to see the rest.` }
      : {}),
    ...(zero || undecided === undefined ? {} : { why: undecided.conclusion }),
    complexConditions: (conditions ?? []).map(shown),
    detailedConditions: (circuits ?? []).map((condition) => ({ kind: condition.kind, ...shown(condition) })),
    ...listedTrees(context),
    ...stateAndFlows(context, complex.applies === 'yes', detailed.applies === 'yes'),
    nearest: nearestOf(context, conditions, complex.applies === 'yes'),
    cycles: (circuits ?? []).map((condition) => cycleOf(context, condition)),
    verdicts: SHOWN.map((id) => context.verdict(id)),
    units: resultUnits(network),
  };
}

/** The network with some constants replaced; a number stands for the decimal it prints as. */
function withConstants(network: Network, constants: Readonly<Record<string, number>>): Network {
  if (Object.keys(constants).length === 0) return network;
  const values = resolveValues(network, { constants }).constants;
  return {
    ...network,
    constants: network.constants.map((constant, i) => {
      if (!Object.hasOwn(constants, constant.name)) return constant;
      const value = values[i]!;
      const quantity: Quantity = { value, exact: parseRational(String(value)) };
      return { ...constant, quantity };
    }),
  };
}

function shown({ expression, left, right, holds }: ComplexCondition | DetailedCondition) {
  return { expression, left, right, holds };
}

function listedTrees(context: TheoremContext): Pick<BalanceResult, 'treeConstants'> {
  const constants = context.exactConstants;
  if (constants === null || context.complexCount > LISTED) return {};
  const trees = treeConstants(context, constants);
  if (trees === null) return {};
  return {
    treeConstants: trees.map((value, y) => ({
      complex: context.complexLabel(y),
      value: formatRational(rational(value)),
    })),
  };
}

type StatePart = Pick<BalanceResult, 'equilibrium' | 'residual' | 'stateOf' | 'entropyProduction'>;

/** The steady state of the class of the start (of ones, where the text gives none) and what flows at it. */
function stateAndFlows(context: TheoremContext, balanced: boolean, detailed: boolean): StatePart {
  const constants = context.exactConstants;
  const none: StatePart = { residual: null, entropyProduction: null };
  if (constants === null || context.kinetics.otherLaw !== null || !context.dense) return none;
  const given = context.exactStart?.map(toDouble);
  const stateOf = given === undefined ? 'ones' : 'start';
  const inside = interiorStart(context, given ?? context.species.map(() => 1));
  if (inside === null) return none;
  const state = balanced
    ? balancedState(context, constants, inside)
    : steadyState(context, constants, inside);
  if (state === null) return none;
  const fluxes = fluxesAt(context, doublesOf(constants), state);
  const pairs = reversiblePairs(context);
  return {
    ...(balanced
      ? { equilibrium: Object.fromEntries(state.map((value, i) => [context.species[i]!, value])) }
      : {}),
    residual: complexResidual(context, fluxes),
    stateOf,
    entropyProduction: pairs === null ? null : detailed ? 0 : entropyProductionOf(pairs, fluxes),
  };
}

function balancedState(
  context: TheoremContext,
  constants: readonly Rational[],
  start: readonly number[],
): number[] | null {
  const logarithms = balancedLogarithms(context, constants);
  return logarithms && balancedStateOfClass(context, logarithms, start);
}

function steadyState(
  context: TheoremContext,
  constants: readonly Rational[],
  start: readonly number[],
): number[] | null {
  const system = massActionSystem(context);
  return system && relax(system, doublesOf(constants), start);
}

function nearestOf(
  context: TheoremContext,
  conditions: readonly ComplexCondition[] | null,
  balanced: boolean,
): BalanceResult['nearest'] {
  if (conditions === null || context.exactConstants === null) return null;
  const named = namedShares(context);
  if (balanced)
    return { constants: Object.fromEntries(named.map(({ name, value }) => [name, value])), distance: 0 };
  return nearestConstants(
    context,
    conditions.map(({ exponents }) => exponents),
    named,
  );
}

function cycleOf(context: TheoremContext, { kind, exponents }: DetailedCondition): BalanceCycle {
  const pairs = reversiblePairs(context)!;
  const coefficients: Record<string, number> = {};
  exponents.forEach((exponent, j) => {
    if (exponent !== 0n) coefficients[context.arrowLabel(pairs[j]!.forward)] = Number(exponent);
  });
  return { kind, coefficients, affinity: affinityOf(context, pairs, exponents) };
}

/** Σ u_j ln(k+_j / k−_j); null where values are missing. */
function affinityOf(
  context: TheoremContext,
  pairs: readonly ReversiblePair[],
  exponents: readonly bigint[],
): number | null {
  const constants = context.exactConstants;
  if (constants === null) return null;
  return exponents.reduce((sum, exponent, j) => {
    if (exponent === 0n) return sum;
    const { forward, backward } = pairs[j]!;
    return sum + Number(exponent) * (lnOfRational(constants[forward]!) - lnOfRational(constants[backward]!));
  }, 0);
}
