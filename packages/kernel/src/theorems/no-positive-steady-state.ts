import { notConsistent, ratesFollowReactants } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Feinberg 1987: a positive steady state or periodic orbit needs a positive flux in the kernel of N. */
export const noPositiveSteadyState: Theorem = {
  id: 'no-positive-steady-state',
  title: 'No positive steady state',
  statement:
    'A network that is not consistent has no positive steady state and no periodic solution through a positive state, whatever its rates, so long as they are continuous and positive exactly when all reactants are present.',
  citation: [sources.feinberg1987],
  kinetics: 'general',
  judge(context) {
    const hypotheses = [notConsistent(context), ratesFollowReactants(context)];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      scope: 'all constants',
      hypotheses,
      conclusion: {
        yes: `For all constants, and for all other rates that are continuous and positive exactly when all reactants are present, there is no positive steady state and no non-constant periodic solution through a positive state${hypotheses[0]?.witness === undefined ? '' : ': the weighted sum of species shown rises strictly at every positive state'}.`,
        no: 'The theorem does not apply: nothing follows from it, neither that a positive steady state exists nor that it does not.',
        undecided: 'Undecided; the hypotheses that are open are marked.',
      }[applies],
      silentOn: 'Steady states with a species at zero, and the behaviour of counts.',
    };
  },
};
