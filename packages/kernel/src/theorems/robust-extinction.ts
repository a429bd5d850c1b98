import type { Hypothesis } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { conservative, consistent, deficiencyIs, massActionInCounts } from './hypotheses.ts';
import { comparablePairs } from './robust-pairs.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Anderson, Enciso, Johnston 2014, in the form with y ≤ y'. */
export const robustExtinction: Theorem = {
  id: 'robust-extinction',
  title: 'Extinction in counts beside robust concentrations',
  statement:
    'In counts, a conservative mass-action network of deficiency 1 that is consistent and has two non-terminal complexes one of which contains the other comes, with probability one, to a last reaction that leaves a non-terminal complex.',
  citation: [sources.andersonEncisoJohnston2014],
  kinetics: 'mass action',
  judge(context) {
    const hypotheses = [
      massActionInCounts(context),
      deficiencyIs(context, 1),
      consistent(context),
      conservative(context),
      nestedPair(context),
    ];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      scope: 'all constants',
      hypotheses,
      conclusion: {
        yes: `In counts, from every start and for all constants, with probability one there is a last reaction out of a non-terminal complex (${nonterminalLabels(context)}); afterwards none of them ever reacts again.`,
        no: 'The theorem does not apply. Nothing follows from it: neither that reactions stop for good nor that they go on.',
        undecided: 'Undecided.',
      }[applies],
      silentOn:
        'How long this takes: it may be longer than any experiment, and until then counts may stay near the steady state of the rate equations. The long-time behaviour of rate equations and of counts do not imply each other.',
    };
  },
};

function nestedPair(context: TheoremContext): Hypothesis {
  const claim = 'complexes are nested';
  const text = 'Of two complexes outside the terminal strong classes, one contains the other.';
  if (context.huge)
    return { claim, text: `${text} The network is too large to compare its complexes.`, holds: null };
  const pair = comparablePairs(context)[0];
  return pair === undefined
    ? { claim, text, holds: false }
    : {
        claim,
        text: `${context.complexLabel(pair.lower)} and ${context.complexLabel(pair.upper)} lie outside the terminal strong classes, and the second contains the first.`,
        holds: true,
        witness: { kind: 'set', complexes: [pair.lower, pair.upper] },
      };
}

function nonterminalLabels(context: TheoremContext): string {
  const labels = context.nonterminalComplexes.map((complex) => context.complexLabel(complex));
  return labels.length <= 8 ? labels.join(', ') : `${labels.slice(0, 8).join(', ')}, …`;
}
