import type { Hypothesis, VerdictScope } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { lineBehaviour, lineHypothesis } from './counts/leading-signs.ts';
import { linearDrift } from './counts/linear-drift.ts';
import { massActionInCounts, valuesGiven } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Judgement, Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Meyn, Tweedie 1993; Gupta, Briat, Khammash 2014; Anderson, Cappelletti, Koyama, Kurtz 2018 for complex balance. */
export const nonExplosive: Theorem = {
  id: 'non-explosive',
  title: 'No explosion in counts',
  statement:
    'If some positive linear function g of the counts has mean growth at most c + d g, infinitely many reactions cannot occur in finite time.',
  citation: [
    sources.meynTweedie1993,
    sources.guptaBriatKhammash2014,
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
        yes: `In counts, from every start and for ${route?.scope ?? 'all constants'}, only finitely many reactions occur in finite time.`,
        no:
          route?.name === LEADING
            ? 'From large enough counts infinitely many reactions occur in finite time with positive probability.'
            : 'The theorem does not apply: nothing follows from it, and the counts need not explode.',
        undecided:
          'Undecided: no linear function of this kind was found. It does not follow that the counts explode.',
      }[applies],
      silentOn:
        'Whether counts stay bounded. The long-time behaviour of counts and that of rate equations do not imply each other.',
    };
  },
};

/** The route by the classification of counts on a line. */
const LEADING = 'leading terms';

interface Route {
  readonly name: string;
  readonly scope: VerdictScope;
  readonly hypotheses: readonly Hypothesis[];
}

function routeOf(context: TheoremContext): Route {
  const claim = 'linear growth';
  const drift = linearDrift(context, 'bounded growth');
  if (drift !== null) {
    const each = drift.scope === 'all constants' ? 'no reaction with' : 'on average no reactant complex of';
    return {
      name: 'linear function',
      scope: drift.scope,
      hypotheses: [
        {
          claim,
          text: `A linear function ${drift.words} exists that ${each} two or more such molecules raises.`,
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
      scope: balanced.scope === 'all constants' ? 'all constants' : 'these constants',
      hypotheses: [
        { claim: 'complex balanced', text: 'The rate equations are complex balanced.', holds: true },
      ],
    };
  }
  const line = lineBehaviour(context);
  if (line !== null) {
    return {
      name: LEADING,
      scope: line.scope,
      hypotheses: [lineHypothesis(line, 'no explosion', !line.explodes)],
    };
  }
  return {
    name: 'open',
    scope: 'all constants',
    hypotheses: [
      ...valuesGiven(context),
      {
        claim,
        text: 'A linear function with positive coefficients grows at most in proportion to itself.',
        holds: null,
      },
    ],
  };
}
