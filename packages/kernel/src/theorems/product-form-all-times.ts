import type { Hypothesis } from '@stillroom/shared/cells';
import { ProportionalSpecies } from './counts/proportional-species.ts';
import { solutionSeries } from './counts/series.ts';
import type { Rational } from '../exact/index.ts';
import { add, formatRational, isZero, multiply, negate, ZERO } from '../exact/index.ts';
import type { TheoremContext } from './context.ts';
import { massActionInCounts, valuesGiven } from './hypotheses.ts';
import { largeComplexes } from './monomolecular.ts';
import { sources } from './sources.ts';
import type { Judgement, Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Derivatives along the solution that are looked at, and species times arrows up to which they are. */
const DERIVATIVES = 8;
const LARGEST = 2_500;
/** Largest coefficient for which powers of series are formed. */
const HIGHEST = 12;

/** Anderson, Schnoerr, Yuan 2020 (necessary and sufficient); Jahnke, Huisinga 2007 without larger complexes. */
export const productFormAllTimes: Theorem = {
  id: 'product-form-all-times',
  title: 'Product form at all times',
  statement:
    'Counts that start independent Poisson with means V a stay so, with means V x(t), exactly when along the solution from a inflow equals outflow at every complex of two or more molecules.',
  citation: [sources.andersonSchnoerrYuan2020, sources.jahnkeHuisinga2007],
  kinetics: 'mass action',
  judge(context): Judgement {
    const rates = massActionInCounts(context);
    const large = largeComplexes(context);
    if (large.length === 0) return always(rates);
    const start = context.exactStart;
    const constants = context.exactConstants;
    const needs = [...valuesGiven(context), ...(start === null ? [startMissing] : [])];
    if (rates.holds !== true) return judged([rates], 'Undecided.');
    if (constants === null || start === null)
      return judged([rates, ...needs], `Needs values: ${lacking(context)}.`);
    if (context.species.length * context.arrows.length > LARGEST || context.highestCoefficient > HIGHEST) {
      return judged(
        [rates, { claim: 'large complexes balance', text: BALANCE, holds: null }],
        'Undecided. The network is too large for the exact derivatives.',
      );
    }
    return judged([rates, balance(context, constants, start, large)], 'Undecided.');
  },
};

const BALANCE =
  'Along the solution from the start, inflow equals outflow at every complex of two or more molecules.';

const startMissing: Hypothesis = {
  claim: 'values given',
  text: 'The start is given by exact numbers.',
  holds: null,
};

/** What has no value yet, as the middle of a sentence. */
function lacking({ constants, exactStart }: TheoremContext): string {
  const start = exactStart === null ? ['no start is given by exact numbers'] : [];
  return [...(constants.why === null ? [] : [constants.why]), ...start].join('; ');
}

function always(rates: Hypothesis): Judgement {
  const hypotheses: Hypothesis[] = [
    rates,
    { claim: 'no large complex', text: 'No complex has two or more molecules.', holds: true },
  ];
  const applies = appliesWhenAllHold(hypotheses);
  return {
    applies,
    scope: 'all constants',
    hypotheses,
    conclusion:
      applies === 'yes'
        ? 'For all constants and every a: counts that start independent Poisson with means V a are independent Poisson with means V x(t) at every time, x the solution of the rate equations from a.'
        : 'The theorem does not apply: nothing follows from it.',
  };
}

function judged(hypotheses: readonly Hypothesis[], open: string): Judgement {
  const applies = appliesWhenAllHold(hypotheses);
  const exact = hypotheses.some(({ claim }) => claim === 'large complexes balance');
  return {
    applies,
    scope: 'these constants and start',
    hypotheses,
    conclusion: {
      yes: 'For these constants and this start: counts that start independent Poisson with means V a are independent Poisson with means V x(t) at every time.',
      no: exact
        ? 'For these constants and this start the law does not stay a product of Poisson laws with means V x(t): the condition is necessary. It says nothing about the stationary law.'
        : 'The theorem does not apply: nothing follows from it.',
      undecided: open,
    }[applies],
    silentOn: 'Starts that are not independent Poisson, such as fixed counts.',
  };
}

/** Decides the balance along the solution: by a derivative that is not zero, or by an argument that all are. */
function balance(
  context: TheoremContext,
  constants: readonly Rational[],
  start: readonly Rational[],
  large: readonly number[],
): Hypothesis {
  const claim = 'large complexes balance';
  const series = solutionSeries(context, constants, start, DERIVATIVES);
  const monomials = new Map<number, Rational[]>();
  const monomial = (complex: number): Rational[] => {
    if (!monomials.has(complex)) monomials.set(complex, series.monomial(complex));
    return monomials.get(complex)!;
  };
  for (const complex of large) {
    const excess = Array.from({ length: DERIVATIVES + 1 }, () => ZERO);
    context.arrows.forEach(({ from, to }, arrow) => {
      if (from !== complex && to !== complex) return;
      const rate = to === complex ? constants[arrow]! : negate(constants[arrow]!);
      monomial(from).forEach((value, k) => (excess[k] = add(excess[k]!, multiply(rate, value))));
    });
    const order = excess.findIndex((value) => !isZero(value));
    if (order < 0) continue;
    const label = context.complexLabel(complex);
    const text = `${BALANCE} At ${label} the coefficient of t^${order} of inflow minus outflow is ${formatRational(excess[order]!)}, not 0.`;
    return { claim, text, holds: false, witness: { kind: 'set', complexes: [complex] } };
  }
  const bound = new ProportionalSpecies(context, constants, start);
  if (large.every((complex) => bound.balances(complex))) {
    return {
      claim,
      text: `${BALANCE} It vanishes identically, because species that start in proportion stay so.`,
      holds: true,
    };
  }
  const steady = series.species.every(([, slope]) => slope === undefined || isZero(slope));
  if (steady)
    return { claim, text: `${BALANCE} The start is a steady state, and it holds there.`, holds: true };
  return {
    claim,
    text: `${BALANCE} The first ${DERIVATIVES} derivatives vanish, and no reason was found why all do.`,
    holds: null,
  };
}
