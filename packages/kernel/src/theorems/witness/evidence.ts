import type { Hypothesis, Verdict, Witness } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import type { PlainNetwork } from './plain-network.ts';

/** What a rule looks at: the network read twice, the verdict and the hypothesis in question. */
export interface Evidence {
  readonly network: Network;
  readonly plain: PlainNetwork;
  readonly verdict: Verdict;
  readonly hypothesis: Hypothesis;
  readonly holds: boolean;
  readonly witness: Witness | undefined;
}

/** Why a claim could be neither confirmed nor refuted here: too large, or of a kind that is not worked out again. */
export class Unconfirmed {
  readonly why: string;
  constructor(why: string) {
    this.why = why;
  }
}

/** Null when the claim is confirmed as it stands (holding or failing), a complaint when it is not, or unconfirmed. */
export type Finding = string | null | Unconfirmed;

export type Rule = (evidence: Evidence) => Finding;
