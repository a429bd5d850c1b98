import type { Applies, Hypothesis } from '@stillroom/shared/cells';
import { discordanceOf } from './concordant.ts';
import type { TheoremContext } from './context.ts';
import { massAction } from './hypotheses.ts';
import type { MinorProducts } from './minors/minor-products.ts';
import { minorProducts } from './minors/minor-products.ts';
import { oppositeMinors } from './minors/opposite-minors.ts';
import { monomolecularUniqueness } from './monomolecular-uniqueness.ts';
import { searchPattern } from './signs/sign-search.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** Craciun, Feinberg 2005 for open networks; Wiuf, Feliu 2013 and Müller et al. 2016 with conservation laws. */
export const injective: Theorem = {
  id: 'injective',
  title: 'Determinant criterion',
  statement:
    'With mass action the rate function is one-to-one on each positive class for all constants exactly when the products det N[I,J]·det B[J,I] are not all zero and all non-zero ones have one sign.',
  citation: [sources.craciunFeinberg2005, sources.wiufFeliu2013, sources.mueller2016],
  kinetics: 'mass action',
  judge(context) {
    const hypotheses = [massAction(context), ...oneSign(context)];
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

function conclusion(applies: Applies): string {
  return {
    yes: 'For all constants the rate function is one-to-one on each positive class; a class has at most one positive steady state, and it is non-degenerate.',
    no: 'For some constants the rate function takes a value twice on some positive class, or this criterion does not apply. It does not follow that there are several positive steady states.',
    undecided: 'Undecided within the size limit; nothing follows from it.',
  }[applies];
}

const claim = 'determinants of one sign';
const text =
  'The products det N[I,J]·det B[J,I] (N the stoichiometric matrix, B the reactant matrix, |I| = |J| = rank N) are not all zero, and all non-zero ones have one sign.';

/** Steps of the list of products that are tried at once, and when nothing else decided. */
const SHORT_LIST = 4_000;
const LONG_LIST = 20_000;
/** Species times arrows above which the long list has no prospect of ending. */
const LONGEST_LISTED = 800;

const compartmental: Hypothesis = {
  claim,
  text: `${text} No complex has two or more molecules, and every linkage class has one terminal strong class, which holds the zero complex where the class does; so they have one sign.`,
  holds: true,
};

/** Decides the sign condition: a full list where it is short, else two opposite products, else the equivalent sign patterns. */
function oneSign(context: TheoremContext): Hypothesis[] {
  return context.memo('one sign', () => {
    const listed = minorProducts(context, SHORT_LIST);
    if (listed !== null) return [fromList(listed)];
    if (monomolecularUniqueness(context)) return [compartmental];
    if (!context.dense) {
      return [{ claim, text: `${text} The network is too large for this test.`, holds: null }];
    }
    const opposite = oppositeMinors(context);
    if (opposite !== null) {
      return [
        {
          claim,
          text: `${text} Here are two of opposite sign.`,
          holds: false,
          witness: { kind: 'minors', pairs: opposite },
        },
      ];
    }
    return fromPatterns(context);
  });
}

function fromList({ positive, negative, examples }: MinorProducts): Hypothesis {
  const witness = { kind: 'minors', pairs: examples } as const;
  if (positive + negative === 0)
    return {
      claim,
      text: `${text} All are zero, so every positive steady state is degenerate.`,
      holds: false,
    };
  if (positive > 0 && negative > 0) {
    return {
      claim,
      text: `${text} Here ${positive} are positive and ${negative} negative.`,
      holds: false,
      witness,
    };
  }
  const count = positive + negative;
  const sign = positive > 0 ? 'positive' : 'negative';
  const found =
    count === 1 ? `The only one that is not zero is ${sign}.` : `All ${count} that are not zero are ${sign}.`;
  return { claim, text: `${text} ${found}`, holds: true, witness };
}

/** Concordance is stronger and cheaper to see; else the patterns that mass action allows are searched. */
function fromPatterns(context: TheoremContext): Hypothesis[] {
  const discordance = discordanceOf(context);
  const search = discordance?.kind === 'none' ? discordance : searchPattern(context, 'mass action');
  if (search.kind === 'none') {
    return [
      {
        claim,
        text: `${text} This holds because no change of the species within a class leaves all net rates unchanged by signs alone: an exhaustive search of ${search.nodes} sign patterns found none.`,
        holds: true,
      },
    ];
  }
  if (search.kind === 'open') {
    const size = context.species.length * context.arrows.length;
    const listed = size <= LONGEST_LISTED ? minorProducts(context, LONG_LIST) : null;
    if (listed !== null) return [fromList(listed)];
    return [
      {
        claim,
        text: `${text} The list is too long, no two of opposite sign were met, and the search of sign patterns was given up after ${search.nodes}.`,
        holds: null,
      },
    ];
  }
  return [
    {
      claim,
      text: `${text} It fails, because this change of the species lies in a class …`,
      holds: false,
      witness: { kind: 'vector', of: 'laws', entries: context.changeEntries(search.change) },
    },
    {
      claim,
      text: '… and this change of the rates, which leaves every species unchanged, is one that mass action can give it.',
      holds: false,
      witness: { kind: 'vector', of: 'fluxes', entries: context.fluxEntries(search.flux) },
    },
  ];
}
