import type { Hypothesis } from '@stillroom/shared/cells';
import { detailedConditions } from '../balance/detailed-conditions.ts';
import type { TheoremContext } from './context.ts';
import { massAction, reversible, valuesGiven } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Wegscheider 1901; Feinberg 1989; Schuster, Schuster 1989. */
export const detailedBalance: Theorem = {
  id: 'detailed-balance',
  title: 'Detailed balance',
  statement:
    'A reversible mass-action network is detailed balanced exactly when its constants close every circuit of complexes and satisfy δ conditions on a spanning forest; then it is complex balanced as well.',
  citation: [sources.wegscheider1901, sources.feinberg1989, sources.schuster1989],
  kinetics: 'mass action',
  judge(context) {
    const conditions = detailedConditions(context);
    const free = conditions?.length === 0;
    const rates = massAction(context);
    const hypotheses = [rates, reversible(context), ...conditionHypotheses(context)];
    const applies = appliesWhenAllHold(hypotheses);
    const irreversible = context.arrowWithoutReverse !== null;
    return {
      applies,
      scope: free || irreversible ? 'all constants' : 'these constants',
      hypotheses,
      conclusion: {
        yes: `${free ? 'For all constants' : 'For these constants'} every positive steady state is detailed balanced: each arrow runs as fast as its reverse, equal rows taken together. The network is therefore complex balanced as well.`,
        no: irreversible
          ? 'No constants are detailed balanced, because some arrow has no reverse. It says nothing about the number or the stability of positive steady states.'
          : rates.holds === false
            ? 'The theorem does not apply, because mass action is not all that changes the species: nothing follows from it.'
            : 'These constants are not detailed balanced. It says nothing about the number or the stability of positive steady states; they may still be complex balanced.',
        undecided:
          context.exactConstants === null
            ? `Needs values: ${context.constants.why}.`
            : 'Undecided; the network is too large for the exact conditions.',
      }[applies],
      silentOn: 'Counts.',
    };
  },
};

function conditionHypotheses(context: TheoremContext): Hypothesis[] {
  if (context.arrowWithoutReverse !== null || context.kinetics.otherLaw !== null) return [];
  const claim = 'detailed balance condition';
  const conditions = detailedConditions(context);
  if (conditions === null) {
    return [
      {
        claim,
        text: 'The constants satisfy the circuit and forest conditions; the network is too large to work them out.',
        holds: null,
      },
    ];
  }
  if (conditions.length === 0) return [];
  return [
    ...valuesGiven(context),
    ...conditions.map(({ kind, expression, holds, left, right }): Hypothesis => {
      const text = `${kind === 'circuit' ? 'Circuit' : 'Spanning forest'}: ${expression}.`;
      return left === null || right === null
        ? { claim, text, holds }
        : { claim, text, holds, witness: { kind: 'number', left, right } };
    }),
  ];
}
