import { noCriticalSiphon, ratesFollowReactants } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/**
 * Angeli, De Leenheer, Sontag 2007: the species that vanish at a steady state form a siphon, and a law supported in it
 * would be zero there and positive on the class.
 */
export const noBoundarySteadyState: Theorem = {
  id: 'no-boundary-steady-state',
  title: 'No steady state on the boundary',
  statement:
    'Without critical siphon, and with rates that are positive exactly when all reactants are present, no positive class has a steady state in which a species is at zero.',
  citation: [sources.angeliDeLeenheerSontag2007],
  kinetics: 'general',
  judge(context) {
    const hypotheses = [ratesFollowReactants(context), ...noCriticalSiphon(context)];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      scope: 'all constants',
      hypotheses,
      conclusion: {
        yes: 'For all constants, no class that contains a positive state has a steady state in which some species is at zero.',
        no: 'The theorem does not apply. It does not follow that such a steady state exists, nor that any species dies out.',
        undecided: 'Undecided.',
      }[applies],
      silentOn: 'Whether positive steady states exist, and counts.',
    };
  },
};
