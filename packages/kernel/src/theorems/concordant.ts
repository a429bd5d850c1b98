import type { Applies, Hypothesis } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { ratesAreWeaklyMonotonic } from './hypotheses.ts';
import { monomolecularUniqueness } from './monomolecular-uniqueness.ts';
import type { PatternSearch } from './signs/sign-search.ts';
import { searchPattern } from './signs/sign-search.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Shinar, Feinberg 2012. */
export const concordant: Theorem = {
  id: 'concordant',
  title: 'Concordance',
  statement:
    'A concordant network with weakly monotonic kinetics has at most one positive steady state in each positive class.',
  citation: [sources.shinarFeinberg2012],
  kinetics: 'general',
  judge(context) {
    const hypotheses = [ratesAreWeaklyMonotonic(context), ...noDiscordance(context)];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      scope: 'all constants',
      hypotheses,
      conclusion: conclusion(applies),
      silentOn: 'Whether a positive steady state exists, its stability, and counts.',
    };
  },
};

/** The search for a pattern that makes the network discordant; null where the network is too large. */
export function discordanceOf(context: TheoremContext): PatternSearch | null {
  return context.memo('discordance', () =>
    context.dense ? searchPattern(context, 'weakly monotonic') : null,
  );
}

function conclusion(applies: Applies): string {
  return {
    yes: 'For all constants, and for every other choice of weakly monotonic laws, the rate function is one-to-one on each positive class, so no class has two positive steady states.',
    no: 'The theorem does not apply. It does not follow that there are several positive steady states.',
    undecided: 'Undecided.',
  }[applies];
}

function noDiscordance(context: TheoremContext): Hypothesis[] {
  const claim = 'concordant';
  const text =
    'The network is concordant: no change of the species within a class can leave every net rate unchanged by signs alone.';
  if (monomolecularUniqueness(context)) {
    const reason =
      'No complex has two or more molecules, and every linkage class has one terminal strong class, which holds the zero complex where the class does; that suffices.';
    return [{ claim, text: `${text} ${reason}`, holds: true }];
  }
  const search = discordanceOf(context);
  if (search === null)
    return [{ claim, text: `${text} The network is too large for the search.`, holds: null }];
  if (search.kind === 'none') {
    return [
      {
        claim,
        text: `${text} An exhaustive search of ${search.nodes} sign patterns found none.`,
        holds: true,
      },
    ];
  }
  if (search.kind === 'open') {
    return [
      { claim, text: `${text} The search was given up after ${search.nodes} sign patterns.`, holds: null },
    ];
  }
  return [
    {
      claim,
      text: `${text} This change of the species lies in a class …`,
      holds: false,
      witness: { kind: 'vector', of: 'laws', entries: context.changeEntries(search.change) },
    },
    {
      claim,
      text: '… and this change of the rates, which leaves every species unchanged, fits its signs.',
      holds: false,
      witness: { kind: 'vector', of: 'fluxes', entries: context.fluxEntries(search.flux) },
    },
  ];
}
