import type { Hypothesis, VerdictScope } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { lineBehaviour, lineHypothesis } from './counts/leading-signs.ts';
import { levelledDrift } from './counts/levelled-drift.ts';
import { linearDrift } from './counts/linear-drift.ts';
import { conservative, massActionInCounts, valuesGiven } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Judgement, Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Meyn, Tweedie 1993; Gupta, Briat, Khammash 2014; on a line Xu, Hansen, Wiuf 2022; complex balance as in `product-form`. */
export const positiveRecurrent: Theorem = {
  id: 'positive-recurrent',
  title: 'Stationary law exists on every closed class of counts',
  statement:
    'If the mean change of some positive linear function of the counts is at most −1 outside a finite set, every closed irreducible set is positive recurrent and carries exactly one stationary law.',
  citation: [
    sources.meynTweedie1993,
    sources.guptaBriatKhammash2014,
    sources.andersonCraciunKurtz2010,
    sources.andersonCappellettiKoyamaKurtz2018,
    sources.xuHansenWiuf2022,
  ],
  kinetics: 'mass action',
  judge(context): Judgement {
    const rates = massActionInCounts(context);
    const route = rates.holds === true ? routeOf(context) : null;
    const hypotheses = [rates, ...(route?.hypotheses ?? [])];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      ...(applies === 'yes' && route !== null ? { case: route.name } : {}),
      scope: route?.scope ?? 'all constants',
      hypotheses,
      conclusion: {
        yes: `In counts and for ${route?.scope ?? 'all constants'}: from every start a finite set is reached in finite mean time, and every closed irreducible set is positive recurrent with exactly one stationary law.`,
        no: route?.no ?? 'The theorem does not apply: nothing follows from it about stationary laws.',
        undecided:
          'Undecided: no linear function of this kind was found. It does not follow that there is no stationary law.',
      }[applies],
      silentOn:
        'The form of the stationary law. The long-time behaviour of counts and that of rate equations do not imply each other.',
    };
  },
};

interface Route {
  readonly name: string;
  readonly scope: VerdictScope;
  /** What is proven where its hypothesis fails. */
  readonly no?: string;
  readonly hypotheses: readonly Hypothesis[];
}

function routeOf(context: TheoremContext): Route {
  const finite = conservative(context);
  if (finite.holds === true) return { name: 'conservative', scope: 'all constants', hypotheses: [finite] };
  const claim = 'inward drift';
  const drift = linearDrift(context, 'inward');
  const levelled = drift?.scope === 'all constants' ? null : levelledDrift(context);
  if (levelled !== null) {
    return {
      name: 'linear function',
      scope: 'all constants',
      hypotheses: levelled.levels.map((level, l) => ({
        claim,
        text:
          l === 0
            ? `For every choice of constants a linear function w0 + ε w1 + … ${levelled.words}, ε small enough, falls on average, by at least 1, outside a finite set of counts of each class; w0 is this.`
            : `… and w${l} is this.`,
        holds: true,
        witness: { kind: 'vector', of: 'laws', entries: context.lawEntries(level) },
      })),
    };
  }
  if (drift !== null) {
    return {
      name: 'linear function',
      scope: drift.scope,
      hypotheses: [
        {
          claim,
          text: `A linear function ${drift.words} falls on average, by at least 1, outside a finite set of counts of each class.`,
          holds: true,
          witness: { kind: 'vector', of: 'laws', entries: context.lawEntries(drift.weights) },
        },
      ],
    };
  }
  const balanced = context.verdict('complex-balance');
  if (balanced.applies === 'yes') {
    return {
      name: 'complex balance',
      scope: balanced.scope,
      hypotheses: [
        { claim: 'complex balanced', text: 'The rate equations are complex balanced.', holds: true },
      ],
    };
  }
  const line = lineBehaviour(context);
  if (line !== null) {
    return {
      name: 'leading terms',
      scope: line.scope,
      hypotheses: [lineHypothesis(line, 'positive recurrence', line.recurrence === 'positive')],
      no: {
        positive: '',
        null: 'From large enough counts a finite set is reached with certainty, but not in finite mean time; an infinite closed irreducible set is null recurrent and carries no stationary law.',
        transient:
          'From large enough counts every finite set is left for good with positive probability; an infinite closed irreducible set is transient and carries no stationary law.',
      }[line.recurrence],
    };
  }
  return {
    name: 'open',
    scope: 'all constants',
    hypotheses: [
      ...valuesGiven(context),
      {
        claim,
        text: 'A linear function with positive coefficients falls on average outside a finite set of counts.',
        holds: null,
      },
    ],
  };
}
