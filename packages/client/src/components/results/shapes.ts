import type { Verdict } from '@stillroom/shared/cells';

/** What is read of each kind's result (the results format); a field that a version does not compute is absent. */

export interface Units {
  readonly time: string | null;
  readonly amount: string | null;
  readonly volume: string | null;
}

/** Coefficients by species name; exact fractions are text. */
export type Sides = Readonly<Record<string, number | string>>;

export interface NetworkReaction {
  readonly label: string;
  readonly row: number;
  readonly from: Sides;
  readonly to: Sides;
  readonly rate: string;
  readonly note: string;
}

export interface NetworkResult {
  readonly species: readonly string[];
  readonly constants: readonly {
    readonly name: string;
    readonly value: number | null;
    readonly unit: string | null;
  }[];
  readonly start: Readonly<Record<string, number>>;
  readonly reactions: readonly NetworkReaction[];
  readonly equations?: readonly { readonly of: string; readonly tex: string }[];
  readonly canonical?: string;
  readonly units: Units | null;
  readonly listed?: false;
}

export interface StructureReaction {
  readonly row: number;
  readonly label: string;
  readonly from: number;
  readonly to: number;
  readonly constant: string | null;
  readonly reverse: number | null;
  readonly law?: string;
}

export interface LinkageClass {
  readonly complexes: readonly number[];
  readonly rank: number;
  readonly deficiency: number;
  readonly terminalStrongLinkageClasses: number;
  readonly weaklyReversible: boolean;
}

export interface StructureCounts {
  readonly species: number;
  readonly complexes: number;
  readonly reactions: number;
  readonly linkageClasses: number;
  readonly strongLinkageClasses?: number;
  readonly terminalStrongLinkageClasses?: number;
  readonly rank: number;
  readonly deficiency: number;
}

export interface ConservationLaw {
  readonly id: string;
  readonly law: Readonly<Record<string, number | string>>;
  readonly of?: string;
}

export interface StructureResult {
  readonly species: readonly string[];
  readonly complexes?: readonly { readonly label: string; readonly of: Sides }[];
  readonly reactions?: readonly StructureReaction[];
  readonly counts: StructureCounts;
  readonly reduced?: boolean;
  readonly reversible: boolean | null;
  readonly weaklyReversible: boolean | null;
  readonly linkageClasses?: readonly LinkageClass[];
  readonly terminalStrongClasses?: readonly (readonly number[])[];
  readonly conservationLaws?: readonly ConservationLaw[] & { readonly complete?: boolean };
  readonly conservative?: boolean | null;
  readonly consistent?: boolean | null;
  readonly siphons?: readonly { readonly species: readonly string[]; readonly critical: boolean }[];
  readonly robustSpecies?: readonly string[];
  readonly verdicts?: readonly Verdict[];
  readonly listed?: false;
}

export interface TrajectoryResult {
  readonly times: readonly number[];
  readonly species: Readonly<Record<string, readonly (number | null)[]>>;
  readonly derived?: Readonly<Record<string, readonly (number | null)[]>>;
  readonly statistics?: { readonly steps: number; readonly rejected: number; readonly method: string };
  readonly conservationDrift?: number | null;
  readonly ended: 'complete' | 'stopped';
  readonly why?: string;
  readonly units: Units | null;
}

export interface BalanceCondition {
  readonly expression?: string;
  readonly kind?: string;
  readonly left: number | string | null;
  readonly right: number | string | null;
  readonly holds: boolean | null;
}

export interface BalanceResult {
  readonly complexBalanced: boolean | null;
  readonly detailedBalanced: boolean | null;
  readonly why?: string;
  readonly complexConditions?: readonly BalanceCondition[];
  readonly detailedConditions?: readonly BalanceCondition[];
  readonly equilibrium?: Readonly<Record<string, number>>;
  readonly residual?: number | null;
  readonly constants?: Readonly<Record<string, number>>;
  readonly nearest?: {
    readonly constants: Readonly<Record<string, number>>;
    readonly distance: number;
  } | null;
  readonly cycles?: readonly {
    readonly kind?: string;
    readonly coefficients: Readonly<Record<string, number>>;
    readonly affinity: number | null;
  }[];
  readonly entropyProduction?: number | null;
  readonly verdicts?: readonly Verdict[];
  readonly units?: Units | null;
}

/** Whether a value can be read as a result at all. */
export const isObject = (value: unknown): value is Readonly<Record<string, unknown>> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
