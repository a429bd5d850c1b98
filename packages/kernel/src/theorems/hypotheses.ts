import type { Hypothesis, HypothesisClaim } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';

/** The hypotheses that several theorems share, each with the evidence a checker needs. */

/** Every law is mass action and nothing but reactions changes a species. */
export function massAction(context: TheoremContext): Hypothesis {
  const { otherLaw, interventions } = context.kinetics;
  const claim = 'mass action';
  const text = 'All rates are mass action, and nothing but reactions changes a species.';
  if (interventions !== null) return { claim, text: `${text} Here ${interventions}.`, holds: false };
  if (otherLaw === null) return { claim, text, holds: true };
  return { claim, text, holds: false, witness: { kind: 'arrow', reaction: otherLaw } };
}

/** Rates are continuous and positive exactly when all reactants are present; read off the laws where possible. */
export function ratesFollowReactants(context: TheoremContext): Hypothesis {
  const { interventions, unclearLaw } = context.kinetics;
  const claim = 'rates follow reactants';
  const text =
    'Every rate is continuous, and positive exactly when all reactants of its reaction are present.';
  if (interventions !== null) return { claim, text: `${text} Here ${interventions}.`, holds: false };
  if (unclearLaw === null) return { claim, text, holds: true };
  return {
    claim,
    text: `${text} The law of this reaction leaves it open.`,
    holds: null,
    witness: { kind: 'arrow', reaction: unclearLaw },
  };
}

/** As `ratesFollowReactants`, and no rate falls when a reactant is added. */
export function ratesAreMonotone(context: TheoremContext): Hypothesis {
  const { interventions, unclearLaw, unclearGrowth } = context.kinetics;
  const claim = 'rates are monotone';
  const text =
    'Every rate is continuous, does not fall when a reactant is added, and is positive exactly when all reactants are present.';
  if (interventions !== null) return { claim, text: `${text} Here ${interventions}.`, holds: false };
  const unclear = unclearLaw ?? unclearGrowth;
  if (unclear === null) return { claim, text, holds: true };
  return {
    claim,
    text: `${text} The law of this reaction leaves it open.`,
    holds: null,
    witness: { kind: 'arrow', reaction: unclear },
  };
}

/** Weakly monotonic: a rate rises strictly with each of its reactants and depends on nothing else. */
export function ratesAreWeaklyMonotonic(context: TheoremContext): Hypothesis {
  const { interventions, unclearLaw, unclearGrowth, unclearRise } = context.kinetics;
  const claim = 'rates are weakly monotonic';
  const text =
    'Every rate is weakly monotonic: it is positive when all its reactants are present, rises when one of them is added to a positive state, and depends on its reactants only.';
  if (interventions !== null) return { claim, text: `${text} Here ${interventions}.`, holds: false };
  const unclear = unclearLaw ?? unclearGrowth ?? unclearRise;
  if (unclear === null) return { claim, text, holds: true };
  return {
    claim,
    text: `${text} The law of this reaction leaves it open.`,
    holds: null,
    witness: { kind: 'arrow', reaction: unclear },
  };
}

/** δ equals the given number. */
export function deficiencyIs(context: TheoremContext, value: number): Hypothesis {
  const claim = 'deficiency';
  const text = `The deficiency is ${value}.`;
  const { deficiency } = context;
  if (deficiency === null)
    return { claim, text: `${text} The network is too large for a proven rank.`, holds: null };
  return {
    claim,
    text,
    holds: deficiency === value,
    witness: { kind: 'number', left: deficiency, right: value },
  };
}

/** Evidence: a positive circulation on the arrows, or an arrow from which no path leads back. */
export function weaklyReversible(context: TheoremContext): Hypothesis {
  const claim = 'weakly reversible';
  const text = 'The network is weakly reversible: every arrow lies on a directed cycle.';
  const oneWay = context.oneWayArrow;
  if (oneWay !== null) {
    return { claim, text, holds: false, witness: { kind: 'arrow', reaction: context.reactionOf(oneWay) } };
  }
  const circulation = context.circulation;
  return circulation === null
    ? { claim, text, holds: true }
    : {
        claim,
        text,
        holds: true,
        witness: { kind: 'vector', of: 'fluxes', entries: context.fluxEntries(circulation) },
      };
}

/** The negation of `weaklyReversible`, with the same evidence. */
export function notWeaklyReversible(context: TheoremContext): Hypothesis {
  const { holds, ...rest } = weaklyReversible(context);
  return {
    ...rest,
    claim: 'not weakly reversible',
    text: 'The network is not weakly reversible: some arrow lies on no directed cycle.',
    holds: holds === null ? null : !holds,
  };
}

/** Every arrow has its reverse; evidence for the contrary is an arrow without one. */
export function reversible(context: TheoremContext): Hypothesis {
  const claim = 'reversible';
  const text = 'The network is reversible: every arrow has its reverse.';
  const lone = context.arrowWithoutReverse;
  return lone === null
    ? { claim, text, holds: true }
    : { claim, text, holds: false, witness: { kind: 'arrow', reaction: context.reactionOf(lone) } };
}

/** Some strictly positive flux keeps all species constant; else a function of the species that only ever grows. */
export function consistent(context: TheoremContext): Hypothesis {
  const claim = 'consistent';
  const text = 'The network is consistent: some positive flux on all arrows leaves every species unchanged.';
  const answer = context.consistency;
  if (answer === null) return withoutWitness(claim, text, context.analysis.consistent);
  return answer.holds
    ? {
        claim,
        text,
        holds: true,
        witness: { kind: 'vector', of: 'fluxes', entries: context.fluxEntries(answer.flux) },
      }
    : {
        claim,
        text,
        holds: false,
        witness: { kind: 'vector', of: 'laws', entries: context.lawEntries(answer.growing) },
      };
}

/** Some linear function that never falls along an arrow rises along one; the contrary of `consistent`. */
export function notConsistent(context: TheoremContext): Hypothesis {
  const { holds, ...rest } = consistent(context);
  return {
    ...rest,
    claim: 'not consistent',
    text: 'The network is not consistent: no positive flux on all arrows leaves every species unchanged.',
    holds: holds === null ? null : !holds,
  };
}

/** Some conservation law has only positive coefficients; else a flux whose net production is nowhere negative. */
export function conservative(context: TheoremContext): Hypothesis {
  const claim = 'conservative';
  const text =
    'The network is conservative: some conservation law has a positive coefficient for every species.';
  const answer = context.conservation;
  if (answer === null) return withoutWitness(claim, text, context.analysis.conservative.holds);
  return answer.holds
    ? {
        claim,
        text,
        holds: true,
        witness: { kind: 'vector', of: 'laws', entries: context.lawEntries(answer.law) },
      }
    : {
        claim,
        text,
        holds: false,
        witness: { kind: 'vector', of: 'fluxes', entries: context.fluxEntries(answer.flux) },
      };
}

/** The answer of the structure, where the evidence would be too long to carry. */
function withoutWitness(claim: HypothesisClaim, text: string, holds: boolean | null): Hypothesis {
  return holds === null
    ? { claim, text: `${text} The network is too large for the exact test.`, holds }
    : { claim, text, holds };
}

/** How many siphons are listed one by one with their laws; above, one sentence speaks for all. */
const LISTED_SIPHONS = 12;
/** Names of one siphon that its sentence shows, and species up to which it is carried as evidence. */
const SHOWN_NAMES = 24;
const LONGEST_WITNESS = 2_000;

/** Every siphon contains the support of a non-negative law; one hypothesis per minimal siphon while they are few. */
export function noCriticalSiphon(context: TheoremContext): Hypothesis[] {
  const claim = 'no critical siphon';
  const { siphons, complete } = context.analysis.siphons;
  const summary = 'Every siphon contains all species of some conservation law that is not negative.';
  const critical = siphons.find((siphon) => siphon.critical === true);
  if (critical !== undefined) {
    const text = `${summary} The siphon ${setText(context, critical.species)} contains none.`;
    if (critical.species.length > LONGEST_WITNESS) return [{ claim, text, holds: false }];
    return [
      {
        claim,
        text,
        holds: false,
        witness: { kind: 'set', species: context.speciesNames(Array.from(critical.species)) },
      },
    ];
  }
  if (!complete) {
    return [{ claim, text: `${summary} There are too many siphons to look at all of them.`, holds: null }];
  }
  if (siphons.some((siphon) => siphon.critical === null)) {
    return [{ claim, text: `${summary} For some siphon this is too large to be decided.`, holds: null }];
  }
  if (siphons.length === 0) return [{ claim, text: `${summary} There is no siphon.`, holds: true }];
  const all: Hypothesis = {
    claim,
    text: `${summary} There ${siphons.length === 1 ? 'is one minimal siphon' : `are ${siphons.length} minimal siphons`}.`,
    holds: true,
  };
  const listed = siphons.slice(0, LISTED_SIPHONS).flatMap(({ species, law }): Hypothesis[] => {
    if (law === null || species.length > LONGEST_WITNESS) return [];
    const text = `The siphon ${setText(context, species)} contains all species of a conservation law that is not negative.`;
    const entries = context.sparseLawEntries(law);
    return [
      { claim: 'siphon holds a law', text, holds: true, witness: { kind: 'vector', of: 'laws', entries } },
    ];
  });
  return [all, ...listed];
}

/** A set of species in braces; long ones are cut. */
function setText(context: TheoremContext, species: Int32Array): string {
  const shown = context.speciesNames(Array.from(species.subarray(0, SHOWN_NAMES)));
  return species.length <= SHOWN_NAMES
    ? `{${shown.join(', ')}}`
    : `{${shown.join(', ')}, …} of ${species.length} species`;
}

/** What strongly endotactic means. */
export const STRONGLY_ENDOTACTIC =
  'The network is strongly endotactic: in every direction that is not orthogonal to all reactions, no reaction leads outwards from the reactant complexes that lie farthest out, and one leads inwards (Gopalkrishnan, Miller, Shiu 2014).';

/** Why a written law is not mass action in counts. */
export const NOT_FALLING = 'A written law with a power of a count is no falling factorial.';

/** Counts need whole numbers of molecules, and rates that are falling factorials. */
export function massActionInCounts(context: TheoremContext): Hypothesis {
  const rates = massAction(context);
  const claim = 'mass action in counts';
  const text =
    'All rates are mass action in counts, with whole numbers of molecules, and nothing but reactions changes a species.';
  if (!context.whole) return { claim, text: `${text} A coefficient is not a whole number.`, holds: false };
  const weighted = [...context.network.weights.keys()].map((species) => context.network.species[species]!);
  if (weighted.length > 0)
    return { claim, text: `${text} Here ${weighted.join(', ')} has a weight of its own.`, holds: false };
  const { unlikeInCounts } = context.kinetics;
  if (rates.holds === true && unlikeInCounts !== null) {
    return {
      claim,
      text: `${text} ${NOT_FALLING}`,
      holds: false,
      witness: { kind: 'arrow', reaction: unlikeInCounts },
    };
  }
  const { witness } = rates;
  return { claim, text, holds: rates.holds, ...(witness === undefined ? {} : { witness }) };
}

/** Every arrow has a positive exact constant; nothing to say where it has. */
export function valuesGiven(context: TheoremContext): Hypothesis[] {
  const { why } = context.constants;
  return why === null
    ? []
    : [{ claim: 'values given', text: `Every constant has a positive exact value: ${why}.`, holds: null }];
}
