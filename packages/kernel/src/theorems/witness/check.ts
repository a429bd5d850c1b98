import type { Applies, Hypothesis, Verdict } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import type { PlainNetwork } from './plain-network.ts';
import { plainNetwork } from './plain-network.ts';
import { rules } from './rules.ts';

/** Whether the evidence of a verdict holds up; `why` names the first thing that does not. */
export interface WitnessCheck {
  readonly ok: boolean;
  readonly why: string;
}

/** Species times reactions above which the plain arithmetic of the checker would take too long. */
const LARGEST = 20_000;

/**
 * Checks a verdict against its network without trusting the prover: every hypothesis that is said to hold or to fail is
 * confirmed from its witness (or, where it needs none, by looking), and `applies` must follow from the hypotheses.
 */
export function checkWitness(network: Network, verdict: Verdict): WitnessCheck {
  const plain = plainNetwork(network);
  if (plain.species.length * plain.reactions.length > LARGEST) {
    return { ok: false, why: 'The network is too large for this checker.' };
  }
  for (const hypothesis of verdict.hypotheses) {
    const complaint = complaintAbout(network, plain, verdict, hypothesis);
    if (complaint !== null) return { ok: false, why: `"${hypothesis.text}": ${complaint}` };
  }
  const expected = followsFrom(verdict.hypotheses);
  if (verdict.applies !== expected) {
    return { ok: false, why: `The hypotheses give "${expected}", the verdict says "${verdict.applies}".` };
  }
  return { ok: true, why: 'Every hypothesis was confirmed from its witness.' };
}

function complaintAbout(
  network: Network,
  plain: PlainNetwork,
  verdict: Verdict,
  hypothesis: Hypothesis,
): string | null {
  if (hypothesis.holds === null) return null;
  try {
    return rules[hypothesis.claim]({
      network,
      plain,
      verdict,
      hypothesis,
      holds: hypothesis.holds,
      witness: hypothesis.witness,
    });
  } catch (error) {
    return `the witness cannot be read (${error instanceof Error ? error.message : String(error)}).`;
  }
}

function followsFrom(hypotheses: readonly Hypothesis[]): Applies {
  if (hypotheses.some(({ holds }) => holds === false)) return 'no';
  return hypotheses.some(({ holds }) => holds === null) ? 'undecided' : 'yes';
}
