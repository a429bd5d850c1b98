import type { Applies, Hypothesis, Verdict } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import type { Finding } from './evidence.ts';
import type { PlainNetwork } from './plain-network.ts';
import { plainNetwork } from './plain-network.ts';
import { rules } from './rules.ts';

/**
 * Whether the evidence of a verdict holds up: `ok` when nothing speaks against it, `confirmed` when besides every
 * hypothesis that holds or fails was confirmed afresh. `why` names the first thing that is missing.
 */
export interface WitnessCheck {
  readonly ok: boolean;
  readonly confirmed: boolean;
  readonly why: string;
}

/** Species times reactions above which the plain arithmetic of the checker would take too long. */
const LARGEST = 20_000;

/**
 * Checks a verdict against its network without trusting the prover: every hypothesis that is said to hold or to fail is
 * confirmed from its witness (or, where it needs none, by looking), and `applies` must follow from the hypotheses.
 */
export function checkWitness(network: Network, verdict: Verdict): WitnessCheck {
  if (network.species.length * network.reactions.count > LARGEST) {
    return refused('The network is too large for this checker.');
  }
  const plain = plainNetwork(network);
  let open: string | null = null;
  for (const hypothesis of verdict.hypotheses) {
    const finding = findingOn(network, plain, verdict, hypothesis);
    if (typeof finding === 'string') return refused(`"${hypothesis.text}": ${finding}`);
    if (finding !== null) open ??= `"${hypothesis.text}": ${finding.why}`;
  }
  const expected = followsFrom(verdict.hypotheses);
  if (verdict.applies !== expected) {
    return refused(`The hypotheses give "${expected}", the verdict says "${verdict.applies}".`);
  }
  return {
    ok: true,
    confirmed: open === null,
    why: open ?? 'Every hypothesis was confirmed from its witness.',
  };
}

function refused(why: string): WitnessCheck {
  return { ok: false, confirmed: false, why };
}

function findingOn(network: Network, plain: PlainNetwork, verdict: Verdict, hypothesis: Hypothesis): Finding {
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
