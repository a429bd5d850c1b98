export type {
  BalanceCondition,
  BalanceResult,
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

/** Whether a value can be read as a result at all. */
export const isObject = (value: unknown): value is Readonly<Record<string, unknown>> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
