import { conservative, noCriticalSiphon, ratesAreMonotone } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Angeli, De Leenheer, Sontag 2007, theorem 2. */
export const persistence: Theorem = {
  id: 'persistence',
  title: 'Persistence',
  statement:
    'In a conservative network without critical siphon, whose rates are positive exactly when all reactants are present and do not fall when one is added, no species tends to zero from a positive start, not even along a sequence of times.',
  citation: [sources.angeliDeLeenheerSontag2007],
  kinetics: 'general',
  judge(context) {
    const hypotheses = [ratesAreMonotone(context), conservative(context), ...noCriticalSiphon(context)];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      scope: 'all constants',
      hypotheses,
      conclusion: {
        yes: 'From every positive start each species stays away from zero: its lower limit for large times is positive, for all constants.',
        no: 'This theorem does not apply. It does not follow that any species dies out.',
        undecided: 'Undecided; it does not follow that any species dies out.',
      }[applies],
      silentOn: 'Counts: a finite number of molecules may still reach zero.',
    };
  },
};
