import { massAction, weaklyReversible } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Boros 2019. */
export const existence: Theorem = {
  id: 'existence',
  title: 'Existence of a positive steady state',
  statement:
    'A weakly reversible network with mass action has a positive steady state in every positive class, for all constants and whatever its deficiency.',
  citation: [sources.boros2019],
  kinetics: 'mass action',
  judge(context) {
    const hypotheses = [massAction(context), weaklyReversible(context)];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      scope: 'all constants',
      hypotheses,
      conclusion:
        applies === 'yes'
          ? 'For all constants every positive class has at least one positive steady state.'
          : 'The theorem does not apply: nothing follows from it, and positive steady states may exist all the same.',
      silentOn: 'How many there are, and whether they are stable.',
    };
  },
};
