import type { Hypothesis, VerdictId } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { deficiencyOneAlgorithm } from './deficiency-one-algorithm/decide.ts';
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
        ],
        conclusion: 'For all constants no positive class has two positive steady states.',
        silentOn: 'Whether a positive steady state exists, its stability, and counts.',
      };
    }
    const several = context.verdict('several-steady-states');
    const hypothesis: Hypothesis = {
      claim: 'at most one by theorem',
      text: 'One of these proves it: deficiency zero, deficiency one, the deficiency one algorithm, the determinant criterion, concordance.',
      holds: several.applies === 'yes' ? false : null,
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

/** A proof that no class has two positive steady states, and the theorem it comes from. */
export interface UniquenessProof {
  readonly by: string;
  /** The end of a sentence: "the deficiency one theorem applies". */
  readonly reason: string;
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
    for (const [id, reason] of routes) if (context.verdict(id).applies === 'yes') return { by: id, reason };
    const algorithm = deficiencyOneAlgorithm(context);
    return algorithm.kind === 'at most one'
      ? {
          by: 'deficiency one algorithm',
          reason: `the network is regular of deficiency one, and each of the ${algorithm.cases} cases of the deficiency one algorithm is impossible`,
        }
      : null;
  });
}
