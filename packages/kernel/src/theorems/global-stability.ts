import type { Hypothesis } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { endotacticity } from './endotactic/strongly-endotactic.ts';
import { noCriticalSiphon, STRONGLY_ENDOTACTIC } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Judgement, Theorem } from './theorem.ts';
import { appliesWhenAllHold } from './theorem.ts';

/** The cases in which the global attractor conjecture is a published theorem. */
export const globalStability: Theorem = {
  id: 'global-stability',
  title: 'Global stability of complex-balanced states',
  statement:
    'In a complex-balanced network every positive start tends to the positive steady state of its class; proven for one linkage class, for rank at most 3, without critical siphon, and for strongly endotactic networks.',
  citation: [
    sources.anderson2011,
    sources.pantea2012,
    sources.craciunNazarovPantea2013,
    sources.angeliDeLeenheerSontag2007,
    sources.anderson2008,
    sources.gopalkrishnanMillerShiu2014,
  ],
  kinetics: 'mass action',
  judge(context): Judgement {
    const balanced = context.verdict('complex-balance');
    const isBalanced: Hypothesis = {
      claim: 'complex balanced',
      text: `The network is complex balanced${balanced.scope === 'all constants' ? ' for all constants' : ' for these constants'}.`,
      holds: { yes: true, no: false, undecided: null }[balanced.applies],
    };
    const scope = balanced.scope === 'all constants' ? 'all constants' : 'these constants';
    const route = balanced.applies === 'yes' ? provenRoute(context) : null;
    const hypotheses = [isBalanced, ...(route?.hypotheses ?? [])];
    const applies = appliesWhenAllHold(hypotheses);
    return {
      applies,
      ...(route === null || applies !== 'yes' ? {} : { case: route.name }),
      scope,
      hypotheses,
      conclusion: {
        yes: `${scope === 'all constants' ? 'For all constants' : 'For these constants'} every solution with a positive start tends to the positive steady state of its class.`,
        no: 'The theorem does not apply. It does not follow that some start stays away from a steady state.',
        undecided:
          balanced.applies === 'yes'
            ? 'Undecided: none of the published cases covers this network. The general proof announced in 2015 is not relied on.'
            : balanced.conclusion,
      }[applies],
      silentOn: 'Starts with a species at zero, how fast solutions approach, and counts.',
    };
  },
};

interface Route {
  readonly name: string;
  readonly hypotheses: readonly Hypothesis[];
}

function provenRoute(context: TheoremContext): Route {
  const claim = 'attraction is proven';
  const classes = context.linkageClasses.length;
  if (classes === 1) {
    return {
      name: 'one linkage class',
      hypotheses: [
        {
          claim,
          text: 'There is one linkage class (Anderson 2011).',
          holds: true,
          witness: { kind: 'number', left: 1, right: 1 },
        },
      ],
    };
  }
  const { rank } = context;
  if (rank !== null && rank <= 3) {
    return {
      name: 'rank at most 3',
      hypotheses: [
        {
          claim,
          text: 'The rank is at most 3 (Pantea 2012; Craciun, Nazarov, Pantea 2013).',
          holds: true,
          witness: { kind: 'number', left: rank, right: 3 },
        },
      ],
    };
  }
  const siphons = noCriticalSiphon(context);
  if (siphons.every(({ holds }) => holds === true))
    return { name: 'no critical siphon', hypotheses: siphons };
  const endotactic = endotacticity(context);
  if (endotactic.kind === 'yes') {
    return {
      name: 'strongly endotactic',
      hypotheses: [{ claim: 'strongly endotactic', text: STRONGLY_ENDOTACTIC, holds: true }],
    };
  }
  const reason =
    endotactic.kind === 'no'
      ? ` It is not strongly endotactic: see the direction ${directionText(context, endotactic.direction)}.`
      : ' Whether it is strongly endotactic is too large to be decided.';
  return {
    name: 'open',
    hypotheses: [
      {
        claim,
        text: `There is one linkage class, or the rank is at most 3, or no siphon is critical, or the network is strongly endotactic. None of these holds here, or it could not be decided.${reason}`,
        holds: null,
      },
    ],
  };
}

/** "2 A − B": a linear function of the species; long ones are cut. */
function directionText(context: TheoremContext, direction: readonly bigint[]): string {
  const terms = direction.flatMap((weight, i) =>
    weight === 0n ? [] : [{ weight, name: context.species[i]! }],
  );
  const shown = terms.slice(0, SHOWN_TERMS).map(({ weight, name }, k) => {
    const size = weight < 0n ? -weight : weight;
    const sign = weight < 0n ? (k === 0 ? '−' : ' − ') : k === 0 ? '' : ' + ';
    return `${sign}${size === 1n ? '' : `${size} `}${name}`;
  });
  return `${shown.join('')}${terms.length > SHOWN_TERMS ? ' …' : ''}`;
}

const SHOWN_TERMS = 12;
