import type { ResultUnits } from './network.ts';
import type { Verdict } from './verdict.ts';

/** One condition on the constants, both sides as readable products and as exact numbers. */
export interface BalanceCondition {
  /** "k2^2 = k1*k3"; in tree constants "K(2 A)*K(2 B) = K(A + B)^2" where those are too long to write out. */
  readonly expression: string;
  /** Exact values of the sides ("4", "1/3"); null where values are missing or the number is too long to read. */
  readonly left: string | null;
  readonly right: string | null;
  /** Null where values are missing. */
  readonly holds: boolean | null;
}

/** A condition of detailed balance: a circuit of complexes, or a relation on a spanning forest. */
export interface DetailedBalanceCondition extends BalanceCondition {
  readonly kind: 'circuit' | 'forest';
}

/** A cycle of reversible pairs with its affinity Σ u_j ln(k+_j / k−_j); null where values are missing. */
export interface BalanceCycle {
  readonly kind: 'circuit' | 'forest';
  /** u by the label of the forward reaction ("A -> B"); entries that are 0 are absent. */
  readonly coefficients: Readonly<Record<string, number>>;
  readonly affinity: number | null;
}

/** The class that a state belongs to: that of the start, or that of the state with 1 everywhere. */
export type BalanceClass = 'start' | 'ones';

/** The result of a balance cell. Nulls mean undecided; `why` says what is missing. */
export interface BalanceResult {
  readonly complexBalanced: boolean | null;
  readonly detailedBalanced: boolean | null;
  readonly why?: string;
  readonly complexConditions: readonly BalanceCondition[];
  readonly detailedConditions: readonly DetailedBalanceCondition[];
  /** Tree constants by complex, one common factor per linkage class free; absent beyond 200 complexes. */
  readonly treeConstants?: readonly { readonly complex: string; readonly value: string }[];
  /** The complex-balanced state of the class named in `stateOf`, by species. */
  readonly equilibrium?: Readonly<Record<string, number>>;
  /** Largest |inflow − outflow| / max(inflow, outflow) over complexes at the steady state of that class; null: none found. */
  readonly residual: number | null;
  readonly stateOf?: BalanceClass;
  /** Complex-balanced constants nearest to the given ones, and the length of the change of their logarithms. */
  readonly nearest: {
    readonly constants: Readonly<Record<string, number>>;
    readonly distance: number;
  } | null;
  readonly cycles: readonly BalanceCycle[];
  /** Σ (J+ − J−) ln(J+/J−) over reversible pairs at that steady state; null unless every reaction has its reverse. */
  readonly entropyProduction: number | null;
  readonly verdicts: readonly Verdict[];
  readonly units: ResultUnits | null;
}
