import type { Hypothesis } from '@stillroom/shared/cells';
import { complexConditions } from '../balance/complex-conditions.ts';
import type { TheoremContext } from './context.ts';
import { massAction, valuesGiven, weaklyReversible } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Horn 1972; Craciun, Dickenstein, Shiu, Sturmfels 2009. */
export const complexBalance: Theorem = {
  id: 'complex-balance',
  title: 'Complex balance',
  statement:
    'A weakly reversible mass-action network is complex balanced exactly when its tree constants satisfy δ conditions; then every positive steady state is complex balanced, each positive class has exactly one, and it is asymptotically stable relative to its class.',
  citation: [sources.horn1972, sources.hornJackson1972, sources.craciunDickensteinShiuSturmfels2009],
  kinetics: 'mass action',
  judge(context) {
    const structural = context.deficiency === 0;
    const rates = massAction(context);
    const hypotheses = [rates, weaklyReversible(context), ...conditions(context)];
    const applies = appliesWhenAllHold(hypotheses);
    const needsValues = applies === 'undecided' && context.exactConstants === null;
    return {
      applies,
      scope: structural || !context.weaklyReversible ? 'all constants' : 'these constants',
      hypotheses,
      conclusion: {
        yes: `${structural ? 'For all constants' : 'For these constants'} every positive steady state is complex balanced; each positive class has exactly one, asymptotically stable relative to its class, and no non-constant periodic solution passes through a positive state.`,
        no: !context.weaklyReversible
          ? 'No constants are complex balanced, because the network is not weakly reversible. It says nothing about the number or the stability of positive steady states.'
          : rates.holds === false
            ? 'The theorem does not apply, because mass action is not all that changes the species: nothing follows from it.'
            : 'These constants are not complex balanced. It says nothing about the number or the stability of positive steady states.',
        undecided: needsValues
          ? `Needs values: ${context.constants.why}.`
          : 'Undecided; the network is too large for the exact conditions.',
      }[applies],
      silentOn: 'Whether every positive start tends to the steady state, and counts.',
    };
  },
};

function conditions(context: TheoremContext): Hypothesis[] {
  if (context.deficiency === 0 || !context.weaklyReversible || context.kinetics.otherLaw !== null) return [];
  const claim = 'complex balance condition';
  const list = complexConditions(context);
  if (list === null) {
    return [
      {
        claim,
        text: 'The constants satisfy the conditions on the tree constants; there are too many complexes to work them out.',
        holds: null,
      },
    ];
  }
  return [
    ...valuesGiven(context),
    ...list.map(({ expression, holds, left, right }): Hypothesis => {
      const text = `${expression}.`;
      return left === null || right === null
        ? { claim, text, holds }
        : { claim, text, holds, witness: { kind: 'number', left, right } };
    }),
  ];
}
