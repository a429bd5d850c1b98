import type { Hypothesis } from '@stillroom/shared/cells';
import type { Expression } from '@stillroom/shared/expression';
import { elementary, evaluate } from '@stillroom/shared/expression';
import { balancedLogarithms } from '../../balance/balanced-state.ts';
import { exactBalancedState } from '../../balance/exact-state.ts';
import type { Rational } from '../../exact/index.ts';
import { multiply, rationalForResult, toDouble } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import { massAction, NOT_FALLING } from '../hypotheses.ts';
import { moleculesPerUnit } from './count-scale.ts';
import { isSummable, weightGrowth } from './weight-growth.ts';
import { positiveBeyond } from './weight-positive.ts';

/** In counts: mass action with whole numbers of molecules, weights allowed. */
export function countRates(context: TheoremContext): Hypothesis {
  const claim = 'mass action or weights in counts';
  const text =
    'In counts every rate is mass action, with the weight of a species in place of its count where one is given, and molecules come in whole numbers.';
  const rates = massAction(context);
  if (!context.whole) return { claim, text: `${text} A coefficient is not a whole number.`, holds: false };
  const { unlikeInCounts } = context.kinetics;
  if (rates.holds === true && unlikeInCounts !== null) {
    return {
      claim,
      text: `${text} ${NOT_FALLING}`,
      holds: false,
      witness: { kind: 'arrow', reaction: unlikeInCounts },
    };
  }
  const { witness } = rates;
  return { claim, text, holds: rates.holds, ...(witness === undefined ? {} : { witness }) };
}

/** Values of n for which a weight is evaluated; beyond, it has to be positive by its form. */
const CHECKED = 200;

/** One hypothesis for each weighted species: positive, and summable where its count is not bounded by a law. */
export function weightsSummable(context: TheoremContext): Hypothesis[] {
  return [...context.network.weights].flatMap(([written, weight]): Hypothesis[] => {
    const species = context.structure.sourceSpecies.indexOf(written);
    if (species < 0) return [];
    const doubt = positivityDoubt(context, context.species[species]!, weight);
    return [doubt ?? summability(context, species, weight)];
  });
}

/** Null where the weight is positive for every n ≥ 1. */
function positivityDoubt(context: TheoremContext, name: string, weight: Expression): Hypothesis | null {
  const claim = 'weight summable';
  const text = `The weight of ${name} is positive for every n ≥ 1`;
  for (let n = 1; n <= CHECKED; n++) {
    const missing: string[] = [];
    const value = evaluate(weight, (constant) => {
      const known = constant === 'n' ? n : constantNamed(context, constant)?.value;
      if (known === undefined) missing.push(constant);
      return known ?? NaN;
    });
    if (missing.length > 0) return { claim, text: `${text}; ${missing[0]} has no value.`, holds: null };
    if (!(value > 0)) return { claim, text: `${text}; at n = ${n} it is not.`, holds: false };
  }
  const exact = (constant: string): Rational | null => constantNamed(context, constant)?.exact ?? null;
  return positiveBeyond(weight, exact, CHECKED)
    ? null
    : { claim, text: `${text}; this was seen up to n = ${CHECKED} only.`, holds: null };
}

function constantNamed(context: TheoremContext, name: string) {
  return context.network.constants.find((constant) => constant.name === name)?.quantity ?? undefined;
}

function summability(context: TheoremContext, species: number, weight: Expression): Hypothesis {
  const claim = 'weight summable';
  const name = context.species[species]!;
  const text = `The terms C^n/∏ θ(j) of ${name} have a finite sum.`;
  if (context.conservation?.holds === true) {
    return { claim, text: `${text} Its count is bounded, because the network is conservative.`, holds: true };
  }
  const growth = weightGrowth(weight, (constant) => constantNamed(context, constant)?.exact ?? null);
  if (growth === null)
    return {
      claim,
      text: `${text} The growth of the weight could not be read off its expression.`,
      holds: null,
    };
  if (growth.kind === 'unbounded')
    return { claim, text: `${text} The weight grows without bound.`, holds: true };
  if (context.lawBasis.some((law) => law[species] !== 0n)) {
    return {
      claim,
      text: `${text} ${name} takes part in a conservation law that does not bound it.`,
      holds: null,
    };
  }
  const c = parameterOf(context, species);
  if (c === null) return { claim, text: `${text} This depends on C, and values are missing.`, holds: null };
  const limit = growth.kind === 'level' ? rationalForResult(growth.limit) : 0;
  const left = c.exact === null ? c.near : rationalForResult(c.exact);
  return {
    claim,
    text,
    holds: isSummable(growth, c),
    witness: { kind: 'number', left, right: limit },
  };
}

/** C = V c of a species that no conservation law touches: the same in every complex-balanced state. */
function parameterOf(
  context: TheoremContext,
  species: number,
): { exact: Rational | null; near: number } | null {
  const constants = context.exactConstants;
  const logarithms = constants && balancedLogarithms(context, constants);
  const scale = moleculesPerUnit(context.network, context.structure.sourceSpecies[species]!);
  if (logarithms === null || scale === null) return null;
  const exact = exactBalancedState(context)?.[species];
  return {
    exact: exact === undefined ? null : multiply(scale, exact),
    near: toDouble(scale) * elementary.exp(logarithms[species]!),
  };
}
