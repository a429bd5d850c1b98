import type { Expression } from '../expression/expression.ts';

/** An exact rational number in lowest terms; `denominator` > 0. */
export interface Rational {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

/**
 * A number of the text, converted to the units of the text's results (first time unit, first amount unit).
 * `exact` is null where the value is not a rational expression of decimals (for instance `let a = exp(2)`);
 * `value` is `exact` rounded once.
 */
export interface Quantity {
  readonly value: number;
  readonly exact: Rational | null;
}

/** The value of a species; `expression` where it is derived from constants, so that it follows trial values of them. */
export interface StartQuantity extends Quantity {
  readonly expression?: Expression;
}

/**
 * Complexes in order of first appearance, as compressed rows: complex i holds the species
 * `species[offsets[i] .. offsets[i+1]-1]` (ascending within a complex) with coefficient
 * numerators[j] / (denominators ? denominators[j] : 1). Numerators and denominators are integers below 2^53, positive.
 * The zero complex is an empty row.
 */
export interface ComplexTable {
  readonly count: number;
  readonly offsets: Int32Array;
  readonly species: Int32Array;
  readonly numerators: Float64Array;
  readonly denominators: Float64Array | null;
}

/**
 * Every written arrow, in order of writing, backward after forward. Several entries may have equal sides (equal rows):
 * structure merges them, lists keep them.
 */
export interface ReactionTable {
  readonly count: number;
  /** Index of the reactant and product complex. */
  readonly from: Int32Array;
  readonly to: Int32Array;
  /** Index into `rows` of the row that wrote it. */
  readonly row: Int32Array;
  /** Index into `constants`, or -1 where a law stands in its place. */
  readonly constant: Int32Array;
  /** Index into `laws`, or -1 for mass action. */
  readonly law: Int32Array;
  /** The arrow in the opposite sense that the same `<=>` wrote, or -1. */
  readonly partner: Int32Array;
}

/** One row of the text: a chain of arrows or a family of them. */
export interface NetworkRow {
  /** 1-based line of the text where the row begins. */
  readonly line: number;
  readonly note: string;
  /** How many reactions it stands for. */
  readonly reactions: number;
  readonly family: boolean;
}

/** A rate constant or another named number. `quantity` is null where the text gives no value. */
export interface Constant {
  readonly name: string;
  readonly quantity: Quantity | null;
  /** The unit it is given in for results, as printed ("/uM/s"), null where the text is without units. */
  readonly unit: string | null;
  /** Index of the 1-based line of its value, or of its first use. */
  readonly line: number;
  /** For a value that is derived from other constants: how, so that it follows trial values of them. */
  readonly expression?: Expression;
}

/**
 * A law that replaces mass action: `net` laws may be negative and stand on the forward arrow of a `<=>`
 * (the backward arrow then has `law` pointing at a zero law). `massAction` holds the index of the constant when the
 * law is one constant times the reactant powers.
 */
export interface RateLaw {
  readonly expression: Expression;
  readonly net: boolean;
  readonly massAction: number | null;
}

/** The units of all results of a text; null fields where the text has none. */
export interface NetworkUnits {
  readonly time: string | null;
  readonly amount: string | null;
  readonly volume: string | null;
}

export interface NetworkEvent {
  readonly line: number;
  readonly when: Expression;
  readonly set: readonly { readonly name: string; readonly value: Expression }[];
}

export interface Compartment {
  readonly name: string;
  readonly volume: Quantity;
  readonly unit: string | null;
  /** Species placed here by `in`; the first compartment holds the rest. */
  readonly species: readonly number[];
}

/**
 * A network as its text says it: families expanded, units converted, names resolved. Species stand in order of first
 * appearance. `fix` has not been applied: the kernel reduces.
 */
export interface Network {
  readonly species: readonly string[];
  readonly complexes: ComplexTable;
  readonly reactions: ReactionTable;
  readonly rows: readonly NetworkRow[];
  readonly constants: readonly Constant[];
  readonly laws: readonly RateLaw[];
  /** Start values by species index; absent means 0. */
  readonly start: ReadonlyMap<number, StartQuantity>;
  /** Species held constant by `fix`, by species index. */
  readonly fixed: ReadonlyMap<number, StartQuantity>;
  /** `let` of species or `t`: outputs in order of writing. */
  readonly outputs: readonly { readonly name: string; readonly expression: Expression }[];
  /** Weight of a species as an expression in `n`, by species index; absent means mass action. */
  readonly weights: ReadonlyMap<number, Expression>;
  readonly events: readonly NetworkEvent[];
  /** `rate X = …` by species index. */
  readonly rateRules: ReadonlyMap<number, Expression>;
  readonly compartments: readonly Compartment[];
  readonly units: NetworkUnits;
}
