import type { Hypothesis, Verdict, VerdictId } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { degreeCriterion } from './degree-criterion.ts';
import { deficiencyOneAlgorithm } from './deficiency-one-algorithm/decide.ts';
import { massAction } from './hypotheses.ts';
import { sources } from './sources.ts';
import type { Theorem } from './theorem.ts';

/** Gathers whichever proof of uniqueness exists. */
export const atMostOne: Theorem = {
  id: 'at-most-one',
  title: 'At most one positive steady state',
  statement:
    'Some theorem of this list shows that no positive class has two positive steady states, for all constants.',
  citation: [
    sources.feinberg1987,
    sources.feinberg1988,
    sources.feinberg1995multiple,
    sources.mueller2016,
    sources.shinarFeinberg2012,
    sources.conradiFeliuMinchevaWiuf2017,
    sources.hofbauer1990,
  ],
  kinetics: 'general',
  judge(context) {
    const proof = uniquenessProof(context);
    if (proof !== null) {
      return {
        applies: 'yes',
        case: proof.by,
        scope: 'all constants',
        hypotheses: [
          {
            claim: 'at most one by theorem',
            text: `Two positive steady states of one class are excluded: ${proof.reason}.`,
            holds: true,
          },
          ...proof.hypotheses,
        ],
        conclusion: 'For all constants no positive class has two positive steady states.',
        silentOn: 'Whether a positive steady state exists, its stability, and counts.',
      };
    }
    const several = context.verdict('several-steady-states');
    const hypothesis: Hypothesis = {
      claim: 'at most one by theorem',
      text: 'One of these proves it: deficiency zero, deficiency one, the deficiency one algorithm, the determinant criterion, concordance, the degree criterion.',
      ...(several.applies === 'yes' ? { holds: false, ...statesOf(several) } : { holds: null }),
    };
    return {
      applies: several.applies === 'yes' ? 'no' : 'undecided',
      scope: 'all constants',
      hypotheses: [hypothesis],
      conclusion:
        several.applies === 'yes'
          ? 'For some constants some class has at least two positive steady states; see the verdict on several steady states.'
          : 'Undecided: none of the theorems proves it, and no two steady states of one class were found. Nothing follows.',
    };
  },
};

/** The two verified states, which refute it. */
function statesOf({ hypotheses }: Verdict): Pick<Hypothesis, 'witness'> {
  const witness = hypotheses.find(({ claim }) => claim === 'several states verified')?.witness;
  return witness === undefined ? {} : { witness };
}

/** A proof that no class has two positive steady states, and the theorem it comes from. */
export interface UniquenessProof {
  readonly by: string;
  /** The end of a sentence: "the deficiency one theorem applies". */
  readonly reason: string;
  /** The hypotheses of that theorem with their evidence; all hold. */
  readonly hypotheses: readonly Hypothesis[];
}

/** The first proof there is, cheap ones first; null where none is known. */
export function uniquenessProof(context: TheoremContext): UniquenessProof | null {
  return context.memo('uniqueness proof', () => {
    const routes: readonly (readonly [VerdictId, string])[] = [
      ['no-positive-steady-state', 'there is no positive steady state at all'],
      ['deficiency-zero', 'the deficiency zero theorem applies'],
      ['deficiency-one', 'the deficiency one theorem applies'],
      ['injective', 'the rate function is one-to-one on each positive class'],
      ['concordant', 'the network is concordant'],
    ];
    for (const [id, reason] of routes) {
      const { applies, hypotheses } = context.verdict(id);
      if (applies === 'yes') return { by: id, reason, hypotheses };
    }
    return byAlgorithm(context) ?? byDegree(context);
  });
}

function byAlgorithm(context: TheoremContext): UniquenessProof | null {
  const algorithm = deficiencyOneAlgorithm(context);
  if (algorithm.kind !== 'at most one') return null;
  const reason = `the network is regular of deficiency one, and each of the ${algorithm.cases} cases of the deficiency one algorithm is impossible`;
  const regular: Hypothesis = {
    claim: 'regular of deficiency one',
    text: `The network is regular of deficiency one, and each of the ${algorithm.cases} cases of the algorithm is impossible: no change of the species within a class has the signs that it asks for.`,
    holds: true,
  };
  return { by: 'deficiency one algorithm', reason, hypotheses: [massAction(context), regular] };
}

function byDegree(context: TheoremContext): UniquenessProof | null {
  const hypotheses = degreeCriterion(context);
  return (
    hypotheses && {
      by: 'degree criterion',
      reason: 'the Jacobian has the same sign at all of them, and the degree criterion applies',
      hypotheses,
    }
  );
}
