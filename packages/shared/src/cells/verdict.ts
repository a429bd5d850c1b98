/** Whether the hypotheses of a theorem hold. "no" never states the opposite of the conclusion. */
export type Applies = 'yes' | 'no' | 'undecided';

/**
 * What a verdict rests on: the network alone, so that it stands whatever the constants are (also a statement that there
 * are constants of some kind), the constants of the text, or those and the start.
 */
export type VerdictScope = 'all constants' | 'these constants' | 'these constants and start';

export type VerdictKinetics = 'mass action' | 'general';

/** The names of all verdicts; they are part of the format and never change their meaning. */
export const verdictIds = [
  'deficiency-zero',
  'deficiency-one',
  'complex-balance',
  'detailed-balance',
  'global-stability',
  'existence',
  'no-positive-steady-state',
  'product-form',
  'product-form-all-times',
  'monomolecular',
  'robust-species',
  'robust-extinction',
  'persistence',
  'no-boundary-steady-state',
  'injective',
  'several-steady-states',
  'at-most-one',
  'mass-transport',
  'one-dimensional',
  'non-explosive',
  'positive-recurrent',
  'concordant',
] as const;
export type VerdictId = (typeof verdictIds)[number];

/** An exact integer or rational as text ("3/2"), or a JSON number where it is a safe integer or a measured value. */
export type WitnessNumber = number | string;

/** A box of numbers proven to hold exactly one positive steady state: [lower, upper] by species name. */
export type WitnessBox = Readonly<Record<string, readonly [number, number]>>;

/** One product det N[I,J] · det B[J,I] of the determinant criterion, with its two factors. */
export interface MinorPair {
  /** Names of the s species I. */
  readonly species: readonly string[];
  /** Indices of the s reactions J in the structure result. */
  readonly reactions: readonly number[];
  readonly stoichiometric: WitnessNumber;
  readonly reactant: WitnessNumber;
}

/**
 * The evidence behind a hypothesis, complete enough for a checker that shares no code with the prover.
 *
 * - `arrow`: a reaction that breaks or proves the hypothesis (index in the structure result).
 * - `vector`: exact entries, zero where absent. `of: "laws"` has species names as keys (a linear function of the
 *   species), `of: "fluxes"` reaction indices, `of: "complexes"` complex indices, all of the structure result.
 * - `set`: species names, or complex indices.
 * - `minors`: products of the determinant criterion.
 * - `states`: exact constants (by constant name), exact totals, and boxes with one positive steady state each.
 * - `number`: two numbers whose comparison is the hypothesis.
 */
export type Witness =
  | { readonly kind: 'arrow'; readonly reaction: number }
  | {
      readonly kind: 'vector';
      readonly of: 'laws' | 'fluxes' | 'complexes';
      readonly entries: Readonly<Record<string, WitnessNumber>>;
    }
  | { readonly kind: 'set'; readonly species: readonly string[] }
  | { readonly kind: 'set'; readonly complexes: readonly number[] }
  | { readonly kind: 'minors'; readonly pairs: readonly MinorPair[] }
  | {
      readonly kind: 'states';
      /** Exact rational by reaction index: the constant of that arrow (of its equal rows together). */
      readonly constants: Readonly<Record<string, WitnessNumber>>;
      readonly totals: readonly {
        readonly law: Readonly<Record<string, WitnessNumber>>;
        readonly value: WitnessNumber;
      }[];
      readonly boxes: readonly WitnessBox[];
    }
  | { readonly kind: 'number'; readonly left: WitnessNumber; readonly right: WitnessNumber };

/** What a hypothesis claims, for a checker; the text says the same to people. */
export const hypothesisClaims = [
  'mass action',
  'mass action in counts',
  'rates follow reactants',
  'rates are monotone',
  'rates are weakly monotonic',
  'deficiency',
  'class deficiency at most one',
  'class deficiencies add up',
  'one terminal class each',
  'weakly reversible',
  'not weakly reversible',
  'reversible',
  'consistent',
  'not consistent',
  'conservative',
  'no critical siphon',
  'siphon holds a law',
  'complexes differ in one species',
  'complexes are nested',
  'determinants of one sign',
  'concordant',
  'values given',
  'complex balance condition',
  'detailed balance condition',
  'complex balanced',
  'attraction is proven',
  'strongly endotactic',
  'critical polynomial of one sign',
  'regular of deficiency one',
  'several states verified',
  'several are excluded',
  'at most one by theorem',
  'mass action or weights in counts',
  'weight summable',
  'no large complex',
  'large complexes balance',
  'mass moves between sites',
  'rates factorise',
  'transport balances',
  'rank one',
  'linear growth',
  'leading terms do not explode',
  'leading terms recur',
  'inward drift',
] as const;
export type HypothesisClaim = (typeof hypothesisClaims)[number];

/** One hypothesis of a theorem; `holds` is null where it could not be decided. */
export interface Hypothesis {
  readonly claim: HypothesisClaim;
  readonly text: string;
  readonly holds: boolean | null;
  readonly witness?: Witness;
}

export interface Citation {
  readonly authors: string;
  readonly year: number;
  readonly title: string;
  /** Journal, volume and pages, where no doi is given. */
  readonly where?: string;
  readonly doi?: string;
}

/**
 * What a published theorem says about a network: the hypotheses one by one with their evidence, and a conclusion
 * that states exactly what is proven. `case` names the part of a theorem that applies.
 */
export interface Verdict {
  readonly id: VerdictId;
  readonly title: string;
  readonly applies: Applies;
  readonly case?: string;
  readonly scope: VerdictScope;
  readonly kinetics: VerdictKinetics;
  readonly hypotheses: readonly Hypothesis[];
  readonly conclusion: string;
  readonly silentOn?: string;
  readonly citation: readonly Citation[];
}
