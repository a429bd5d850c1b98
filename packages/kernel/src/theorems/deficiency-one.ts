import type { Applies, Hypothesis } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { massAction } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Feinberg 1987, 1995; Boros 2012, 2013 on existence without weak reversibility. */
export const deficiencyOne: Theorem = {
  id: 'deficiency-one',
  title: 'Deficiency one theorem',
  statement:
    'With mass action, if no linkage class has a deficiency above 1, the deficiencies of the linkage classes add up to that of the network, and each has one terminal strong class, then for each choice of constants either no positive class has a positive steady state or each has exactly one; a weakly reversible network has one for all constants.',
  citation: [sources.feinberg1987, sources.feinberg1995existence, sources.boros2012, sources.boros2013],
  kinetics: 'mass action',
  judge(context) {
    const hypotheses = [
      massAction(context),
      eachClassAtMostOne(context),
      deficienciesAddUp(context),
      oneTerminalClassEach(context),
    ];
    const applies = appliesWhenAllHold(hypotheses);
    const weakly = context.oneWayArrow === null;
    return {
      applies,
      ...(applies === 'yes' ? { case: weakly ? 'weakly reversible' : 'not weakly reversible' } : {}),
      scope: 'all constants',
      hypotheses,
      conclusion: conclusion(applies, weakly),
      silentOn: 'The stability of a steady state and the existence of periodic solutions.',
    };
  },
};

function conclusion(applies: Applies, weaklyReversible: boolean): string {
  if (applies === 'undecided') return 'Undecided; the hypotheses that are open are marked.';
  if (applies === 'no') {
    return 'The theorem does not apply: nothing follows from it about the existence or the number of positive steady states.';
  }
  return weaklyReversible
    ? 'For all constants every positive class has exactly one positive steady state, and it is non-degenerate.'
    : 'For each choice of constants either no positive class has a positive steady state, or every positive class has exactly one, and it is non-degenerate. Which of the two holds may depend on the constants.';
}

function eachClassAtMostOne(context: TheoremContext): Hypothesis {
  const claim = 'class deficiency at most one';
  const text = 'No linkage class has a deficiency above 1.';
  const deficiencies = classDeficiencies(context);
  if (deficiencies === null) return { claim, text: `${text} ${TOO_LARGE}`, holds: null };
  const largest = deficiencies.reduce((most, deficiency) => Math.max(most, deficiency), 0);
  return { claim, text, holds: largest <= 1, witness: { kind: 'number', left: largest, right: 1 } };
}

function deficienciesAddUp(context: TheoremContext): Hypothesis {
  const claim = 'class deficiencies add up';
  const text = 'The deficiencies of the linkage classes add up to the deficiency of the network.';
  const deficiencies = classDeficiencies(context);
  const whole = context.deficiency;
  if (deficiencies === null || whole === null) return { claim, text: `${text} ${TOO_LARGE}`, holds: null };
  const sum = deficiencies.reduce((total, deficiency) => total + deficiency, 0);
  return { claim, text, holds: sum === whole, witness: { kind: 'number', left: sum, right: whole } };
}

const TOO_LARGE = 'The network is too large for proven ranks.';

function classDeficiencies(context: TheoremContext): number[] | null {
  const deficiencies = context.linkageClasses.flatMap(({ deficiency }) => deficiency ?? []);
  return deficiencies.length === context.linkageClasses.length ? deficiencies : null;
}

function oneTerminalClassEach(context: TheoremContext): Hypothesis {
  const crowded = context.linkageClasses.find((part) => part.terminalStrongClasses.length > 1);
  const claim = 'one terminal class each';
  const text = 'Every linkage class has exactly one terminal strong class.';
  return crowded === undefined
    ? { claim, text, holds: true }
    : {
        claim,
        text,
        holds: false,
        witness: { kind: 'set', complexes: crowded.terminalStrongClasses.map((members) => members[0]!) },
      };
}
