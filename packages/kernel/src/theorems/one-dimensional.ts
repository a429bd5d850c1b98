import type { Hypothesis } from '@stillroom/shared/cells';
import { zerosOnClass } from './class-polynomial.ts';
import type { TheoremContext } from './context.ts';
import { lineBehaviour } from './counts/leading-signs.ts';
import { ratesFollowReactants } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** One equation on each class; the number of its zeros by Sturm's theorem (1829, 1835). Joshi, Shiu 2017 on which networks have several. */
export const oneDimensional: Theorem = {
  id: 'one-dimensional',
  title: 'One-dimensional network',
  statement:
    'When the rank is 1, the rate equations on a class are one autonomous equation: no solution oscillates, and the positive steady states can be counted exactly. Counts that move along the line without end are classified by the leading terms of their rates.',
  citation: [sources.sturm1835, sources.joshiShiu2017, sources.xuHansenWiuf2022],
  kinetics: 'general',
  judge(context) {
    const hypotheses = [rankOne(context), autonomous(context)];
    const applies = appliesWhenAllHold(hypotheses);
    const count = applies === 'yes' ? zerosOnClass(context) : null;
    return {
      applies,
      scope: count === null ? 'all constants' : 'these constants and start',
      hypotheses,
      conclusion: {
        yes: `No solution is periodic without being constant, and every bounded solution tends to a steady state, for all constants.${counted(count)}${inCounts(context)}`,
        no: 'The theorem does not apply. It does not follow that solutions oscillate.',
        undecided: 'Undecided.',
      }[applies],
      silentOn: 'Which steady states are stable.',
    };
  },
};

function counted(count: number | 'all' | null): string {
  if (count === null) return '';
  if (count === 'all') return ' With the constants and the start given, every state of the class is steady.';
  const number =
    count === 0
      ? 'no positive steady state'
      : count === 1
        ? 'exactly one positive steady state'
        : `exactly ${count} positive steady states`;
  return ` With the constants and the start given, the class has ${number}.`;
}

/** What the leading terms of the rates say about counts, where they move along the line without end. */
function inCounts(context: TheoremContext): string {
  const line = lineBehaviour(context);
  if (line === null) return '';
  const recurrence = {
    positive: 'every closed irreducible set is positive recurrent',
    null: 'infinite closed irreducible sets are null recurrent',
    transient: 'infinite closed irreducible sets are transient',
  }[line.recurrence];
  const explosion = line.explodes
    ? 'large counts explode with positive probability'
    : 'there is no explosion';
  return ` In counts, for ${line.scope}: ${recurrence}, and ${explosion}, since ${line.text}.`;
}

function rankOne({ rank }: TheoremContext): Hypothesis {
  const claim = 'rank one';
  const text = 'The rank is 1: all reactions change the species along one line.';
  if (rank === null)
    return { claim, text: `${text} The network is too large for a proven rank.`, holds: null };
  return { claim, text, holds: rank === 1, witness: { kind: 'number', left: rank, right: 1 } };
}

/** Nothing but reactions changes a species, and rates do not depend on time. */
function autonomous(context: TheoremContext): Hypothesis {
  const { text: _, claim: _claim, ...rest } = ratesFollowReactants(context);
  return {
    claim: 'rates follow reactants',
    text: 'Rates depend on the state only and are continuous, and nothing but reactions changes a species.',
    ...rest,
  };
}
