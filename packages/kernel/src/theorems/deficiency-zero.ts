import type { Applies } from '@stillroom/shared/cells';
import {
  deficiencyIs,
  massAction,
  notWeaklyReversible,
  ratesFollowReactants,
  weaklyReversible,
} from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Horn, Jackson 1972; Horn 1972; Feinberg 1972, 1987. */
export const deficiencyZero: Theorem = {
  id: 'deficiency-zero',
  title: 'Deficiency zero theorem',
  statement:
    'A network of deficiency 0 that is not weakly reversible has no positive steady state, whatever its rates, so long as they are continuous and positive exactly when all reactants are present; a weakly reversible one with mass action has exactly one in every positive class, for all constants, complex balanced and asymptotically stable relative to its class.',
  citation: [sources.hornJackson1972, sources.horn1972, sources.feinberg1972, sources.feinberg1987],
  kinetics: 'general',
  judge(context) {
    const reversibility = weaklyReversible(context);
    const deficiency = deficiencyIs(context, 0);
    const hypotheses = reversibility.holds
      ? [deficiency, reversibility, massAction(context)]
      : [deficiency, notWeaklyReversible(context), ratesFollowReactants(context)];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      case: reversibility.holds ? 'weakly reversible' : 'not weakly reversible',
      scope: 'all constants',
      kinetics: reversibility.holds ? 'mass action' : 'general',
      hypotheses,
      conclusion: reversibility.holds
        ? withReversal(applies)
        : withoutReversal(applies, deficiency.holds === true),
      silentOn: reversibility.holds
        ? 'Whether every positive start tends to the steady state, what happens where a species is at zero, and the behaviour of counts.'
        : 'Steady states with a species at zero, and the behaviour of counts.',
    };
  },
};

function withReversal(applies: Applies): string {
  return {
    yes: 'For all constants every positive class has exactly one positive steady state; it is complex balanced and asymptotically stable relative to its class, and no non-constant periodic solution passes through a positive state.',
    no: 'The theorem does not apply: nothing follows from it about the number or the stability of steady states.',
    undecided: 'Undecided; the hypotheses that are open are marked.',
  }[applies];
}

function withoutReversal(applies: Applies, zero: boolean): string {
  if (applies === 'yes') {
    return 'For all constants, and for all other rates that are continuous and positive exactly when all reactants are present, there is no positive steady state and no non-constant periodic solution through a positive state.';
  }
  if (applies === 'no') {
    return 'The theorem does not apply: nothing follows from it about the existence or the number of positive steady states.';
  }
  return !zero
    ? 'Undecided; the hypotheses that are open are marked.'
    : 'If every rate is continuous and positive exactly when all its reactants are present, there is no positive steady state and no non-constant periodic solution through a positive state; the laws as written leave this open.';
}
