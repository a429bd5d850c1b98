import type { HypothesisClaim } from '@stillroom/shared/cells';
import * as balance from './balance-rules.ts';
import * as counts from './count-rules.ts';
import { noSeveralByAlgorithm } from './deficiency-one-rule.ts';
import { stronglyEndotactic } from './endotactic-rule.ts';
import * as graph from './graph-rules.ts';
import * as rates from './rate-rules.ts';
import * as laws from './law-rule.ts';
import { doesNotExplode, recurs } from './line-rule.ts';
import * as signs from './sign-rules.ts';
import type { Rule } from './evidence.ts';
import * as states from './state-rules.ts';
import { weightSummable } from './weight-rule.ts';
import { ratesFactorise, transportBalances } from './transport-rule.ts';
import { largeComplexesBalance } from './time-rule.ts';
import * as vectors from './vector-rules.ts';

/** How each claim is confirmed. */
export const rules: Readonly<Record<HypothesisClaim, Rule>> = {
  'mass action': rates.massAction,
  'mass action in counts': rates.massActionInCounts,
  'rates follow reactants': laws.positiveWithReactants,
  'rates are monotone': laws.growsWithReactants,
  'rates are weakly monotonic': laws.risesWithReactants,
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
  'strongly endotactic': stronglyEndotactic,
  'critical polynomial of one sign': signs.criticalSign,
  'regular of deficiency one': noSeveralByAlgorithm,
  'several states verified': states.severalStates,
  'several are excluded': states.severalExcluded,
  'at most one by theorem': states.atMostOne,
  'mass action or weights in counts': counts.countRates,
  'weight summable': weightSummable,
  'no large complex': counts.noLargeComplex,
  'large complexes balance': largeComplexesBalance,
  'mass moves between sites': counts.sitesOnly,
  'rates factorise': ratesFactorise,
  'transport balances': transportBalances,
  'rank one': graph.rankOne,
  'linear growth': counts.linearGrowth,
  'leading terms do not explode': doesNotExplode,
  'leading terms recur': recurs,
  'inward drift': counts.inwardDrift,
};
