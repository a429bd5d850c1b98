import type { Verdict } from '@stillroom/shared/cells';

export type {
  BySpecies as Sides,
  ConservationLaw,
  LinkageClass,
  ListedReaction as NetworkReaction,
  NetworkResult,
  ResultUnits as Units,
  StructureCounts,
  StructureReaction,
  StructureResult,
  TrajectoryResult,
} from '@stillroom/shared/cells';

/** One condition on the constants, with both its sides. */
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
}

/** Whether a value can be read as a result at all. */
export const isObject = (value: unknown): value is Readonly<Record<string, unknown>> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
