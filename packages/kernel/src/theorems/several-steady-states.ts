import type { Hypothesis } from '@stillroom/shared/cells';
import { fromDouble } from '../exact/index.ts';
import { uniquenessProof } from './at-most-one.ts';
import type { UniquenessProof } from './at-most-one.ts';
import type { TheoremContext } from './context.ts';
import { criticalSigns } from './degree-criterion.ts';
import { constructPair } from './deficiency-one-algorithm/construct.ts';
import { deficiencyOneAlgorithm } from './deficiency-one-algorithm/decide.ts';
import { massAction } from './hypotheses.ts';
import { sources } from './sources.ts';
import { massActionSystem } from './steady-states/mass-action-system.ts';
import { pairForConstants } from './steady-states/pair-for-constants.ts';
import { searchPair } from './steady-states/search-pair.ts';
import type { VerifiedStates } from './steady-states/verified-states.ts';
import { shortened, statesWitness, verifyStates } from './steady-states/verified-states.ts';
import type { Judgement, Theorem } from './theorem.ts';

/** Feinberg 1988, 1995 for the deficiency one algorithm; Krawczyk 1969 for the proof of a pair. */
export const severalSteadyStates: Theorem = {
  id: 'several-steady-states',
  title: 'Several positive steady states',
  statement:
    'For some positive constants some class has at least two positive steady states: shown by exact constants and totals with disjoint boxes, each proven to hold exactly one.',
  citation: [
    sources.krawczyk1969,
    sources.feinberg1988,
    sources.feinberg1995multiple,
    sources.conradiFeliuMinchevaWiuf2017,
    sources.hofbauer1990,
  ],
  kinetics: 'mass action',
  judge(context): Judgement {
    const proof = uniquenessProof(context);
    if (proof !== null) return excluded(proof);
    const rates = massAction(context);
    if (rates.holds !== true) {
      return open(
        [notFound],
        'Undecided: no theorem excludes several positive steady states, and the search for them knows mass action only.',
      );
    }
    const given = forGivenConstants(context);
    if (given !== null) return shown(context, rates, given, 'these constants and start');
    const signs = criticalSigns(context).kind;
    if (signs === 'zero') return open([rates, notFound], DEGENERATE);
    const found =
      constructed(context) ?? (context.dense && signs !== 'one sign' ? searchPair(context) : null);
    return found === null
      ? open([rates, notFound], tried(context))
      : shown(context, rates, found, 'all constants');
  },
};

const notFound: Hypothesis = {
  claim: 'several states verified',
  text: 'Constants and totals with two verified steady states were found.',
  holds: null,
};

function excluded({ by, reason, hypotheses }: UniquenessProof): Judgement {
  return {
    applies: 'no',
    case: by,
    scope: 'all constants',
    hypotheses: [
      {
        claim: 'several are excluded',
        text: `Some constants give a class two positive steady states. This is excluded: ${reason}.`,
        holds: false,
      },
      ...hypotheses,
    ],
    conclusion: 'No constants give a class two positive steady states.',
    silentOn: 'Whether a positive steady state exists, its stability, and counts.',
  };
}

function open(hypotheses: readonly Hypothesis[], conclusion: string): Judgement {
  return { applies: 'undecided', scope: 'all constants', hypotheses, conclusion };
}

function shown(
  context: TheoremContext,
  rates: Hypothesis,
  states: VerifiedStates,
  scope: Judgement['scope'],
): Judgement {
  const count = states.boxes.length;
  return {
    applies: 'yes',
    scope,
    hypotheses: [
      rates,
      {
        claim: 'several states verified',
        text: `These constants and totals have ${count} disjoint boxes, each with exactly one positive steady state.`,
        holds: true,
        witness: statesWitness(context, states),
      },
    ],
    conclusion:
      scope === 'all constants'
        ? `For some constants some class has at least ${count} positive steady states; the constants shown are an example. For other constants there may be fewer.`
        : `With the constants and the start given, the class has at least ${count} positive steady states.`,
    silentOn: 'Which of them are stable, whether there are more, and counts.',
  };
}

/** The constants and the start of the text, where both are exact. */
function forGivenConstants(context: TheoremContext): VerifiedStates | null {
  const constants = context.exactConstants;
  const start = context.exactStart;
  if (constants === null || start === null || !context.dense) return null;
  return pairForConstants(context, constants, start);
}

/** Sizes of μ that are tried: small ones give states close together, large ones constants far apart. */
const SIZES = [2, 1, 4];

/** Two states from a solution of the deficiency one algorithm. */
function constructed(context: TheoremContext): VerifiedStates | null {
  const outcome = deficiencyOneAlgorithm(context);
  const system = massActionSystem(context);
  if (outcome.kind !== 'several' || system === null) return null;
  for (const size of SIZES) {
    const pair = constructPair(context, outcome, size);
    if (pair === null) continue;
    const states = verifyStates(
      system,
      pair.constants.map((value) => fromDouble(shortened(value))),
      pair.states,
    );
    if (states !== null && states.boxes.length >= 2) return states;
  }
  return null;
}

/** Said where no two isolated states can be proven, because there are none. */
const DEGENERATE =
  'Undecided. Every positive steady state is degenerate, because the determinant of the Jacobian on its class is zero at all of them: no box can be proven to hold exactly one. For some constants a class may have a whole continuum of positive steady states, for others none.';

function tried(context: TheoremContext): string {
  const algorithm = deficiencyOneAlgorithm(context);
  const first = {
    several:
      'The deficiency one algorithm says that some constants give several, but no pair could be verified by interval arithmetic.',
    'at most one': '',
    open: 'The deficiency one algorithm has too many cases here.',
    inapplicable: `The deficiency one algorithm does not apply. ${algorithm.kind === 'inapplicable' ? algorithm.why : ''}`,
  }[algorithm.kind];
  const search =
    criticalSigns(context).kind === 'one sign'
      ? 'At every positive steady state the Jacobian has the determinant of a stable one, but the degree criterion needs besides that solutions stay away from infinity and from the boundary, which is not known here.'
      : 'A search through constants for states whose Jacobian has the opposite sign verified no pair, which proves nothing.';
  return `Undecided. Neither the determinant criterion, nor concordance, nor the degree criterion excludes several positive steady states. ${search} ${first}`.trimEnd();
}
