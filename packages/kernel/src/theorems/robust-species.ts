import type { Hypothesis } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { consistent, deficiencyIs, massAction } from './hypotheses.ts';
import { robustPairs, robustNames } from './robust-pairs.ts';
import { robustValue } from './robust-value.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Shinar, Feinberg 2010. */
export const robustSpecies: Theorem = {
  id: 'robust-species',
  title: 'Robust concentrations',
  statement:
    'With mass action and deficiency 1, if two non-terminal complexes differ only in one species, that species has the same concentration in every positive steady state that given constants admit.',
  citation: [sources.shinarFeinberg2010],
  kinetics: 'mass action',
  judge(context) {
    const hypotheses = [
      massAction(context),
      deficiencyIs(context, 1),
      consistent(context),
      ...differingPairs(context),
    ];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      scope: 'all constants',
      hypotheses,
      conclusion: {
        yes: conclusion(context),
        no: 'The theorem does not apply. It does not follow that a concentration depends on the start.',
        undecided: 'Undecided; it does not follow that a concentration depends on the start.',
      }[applies],
      silentOn:
        'Whether positive steady states exist for given constants, whether they are stable, and counts.',
    };
  },
};

function differingPairs(context: TheoremContext): Hypothesis[] {
  const claim = 'complexes differ in one species';
  const text = 'Two complexes outside the terminal strong classes differ in one species only.';
  if (context.huge)
    return [{ claim, text: `${text} The network is too large to compare its complexes.`, holds: null }];
  const pairs = robustPairs(context);
  if (pairs.length === 0) return [{ claim, text, holds: false }];
  return pairs.map(({ species, lower, upper }) => ({
    claim,
    text: `${context.complexLabel(lower)} and ${context.complexLabel(upper)} lie outside the terminal strong classes and differ only in ${context.species[species]}.`,
    holds: true,
    witness: { kind: 'set', complexes: [lower, upper] },
  }));
}

function conclusion(context: TheoremContext): string {
  const names = robustNames(context);
  const each =
    names.length === 1
      ? `${names[0]} has the same concentration in all of them`
      : `each of ${names.slice(0, -1).join(', ')} and ${names.at(-1)} has the same concentration in all of them`;
  return `For each choice of constants that admits positive steady states, ${each}, whatever their class; the value depends on the constants.${values(context)}`;
}

/** The values for the constants of the text, where all are given. */
function values(context: TheoremContext): string {
  const found: string[] = [];
  const seen = new Set<number>();
  for (const pair of robustPairs(context)) {
    if (seen.has(pair.species)) continue;
    seen.add(pair.species);
    const value = robustValue(context, pair);
    if (value === null) continue;
    if (value === 'none') return ' The constants given admit no positive steady state.';
    found.push(`${context.species[pair.species]} = ${value}`);
  }
  return found.length === 0
    ? ''
    : ` For the constants given: ${found.join(', ')}, in every positive steady state they admit.`;
}
