import type { HypothesisClaim, Hypothesis, Verdict, Witness } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import type { PlainNetwork } from './plain-network.ts';
import * as balance from './balance-rules.ts';
import * as counts from './count-rules.ts';
import * as graph from './graph-rules.ts';
import * as rates from './rate-rules.ts';
import * as signs from './sign-rules.ts';
import * as states from './state-rules.ts';
import * as vectors from './vector-rules.ts';

/** What a rule looks at: the network read twice, the verdict and the hypothesis in question. */
export interface Evidence {
  readonly network: Network;
  readonly plain: PlainNetwork;
  readonly verdict: Verdict;
  readonly hypothesis: Hypothesis;
  readonly holds: boolean;
  readonly witness: Witness | undefined;
}

/** Null when the claim is confirmed as it stands (holding or failing), else the complaint. */
export type Rule = (evidence: Evidence) => string | null;

/** How each claim is confirmed. */
export const rules: Readonly<Record<HypothesisClaim, Rule>> = {
  'mass action': rates.massAction,
  'mass action in counts': rates.massActionInCounts,
  'rates follow reactants': rates.otherLaws,
  'rates are monotone': rates.otherLaws,
  'rates are weakly monotonic': rates.otherLaws,
  deficiency: graph.deficiency,
  'class deficiency at most one': graph.classDeficiency,
  'class deficiencies add up': graph.deficienciesAddUp,
  'one terminal class each': graph.oneTerminalClassEach,
  'weakly reversible': graph.weaklyReversible,
  'not weakly reversible': graph.notWeaklyReversible,
  reversible: graph.reversible,
  consistent: vectors.consistent,
  'not consistent': vectors.notConsistent,
  conservative: vectors.conservative,
  'no critical siphon': vectors.noCriticalSiphon,
  'siphon holds a law': vectors.siphonLaw,
  'complexes differ in one species': graph.differInOneSpecies,
  'complexes are nested': graph.nested,
  'determinants of one sign': signs.oneSign,
  concordant: signs.concordant,
  'values given': () => 'it is never said to hold or to fail.',
  'complex balance condition': balance.complexCondition,
  'detailed balance condition': balance.detailedCondition,
  'complex balanced': balance.complexBalanced,
  'attraction is proven': graph.attractionProven,
  'several states verified': states.severalStates,
  'several are excluded': states.severalExcluded,
  'at most one by theorem': states.atMostOne,
  'mass action or weights in counts': counts.countRates,
  'weight summable': counts.unchecked,
  'no large complex': counts.noLargeComplex,
  'large complexes balance': counts.largeComplexesBalance,
  'mass moves between sites': counts.sitesOnly,
  'rates factorise': counts.unchecked,
  'transport balances': counts.unchecked,
  'rank one': graph.rankOne,
  'linear growth': counts.linearGrowth,
  'inward drift': counts.inwardDrift,
};
