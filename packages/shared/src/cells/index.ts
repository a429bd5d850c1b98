export type { CellError } from '../protocol/messages.ts';
export type {
  BalanceClass,
  BalanceCondition,
  BalanceCycle,
  BalanceResult,
  DetailedBalanceCondition,
} from './balance.ts';
export type { CellInput, CellJob, CellOutcome, CellSettings, EndedBy } from './cell.ts';
export { claimSettings, claimVerdicts } from './claim.ts';
export type { ClaimResult, ClaimSide, ClaimVerdict } from './claim.ts';
export { complaintInWords, settingsComplaint } from './complaint.ts';
export { freshName } from './fresh-name.ts';
export { cellKinds, isCellKind } from './kind.ts';
export type { CellKind } from './kind.ts';
export { cellNamePattern, isCellName } from './name.ts';
export { networkSettings } from './network.ts';
export type { ListedReaction, NetworkResult, ResultUnits } from './network.ts';
export { plotFacets, plotMarks, plotSettings } from './plot.ts';
export type { PlotFacet, PlotMark, PlotResult, PlotSettings } from './plot.ts';
export { proseSettings } from './prose.ts';
export type { ProseResult, WovenValue } from './prose.ts';
export { findReferences, mapReferences } from './references.ts';
export type { FoundReference } from './references.ts';
export { cellRegistry } from './registry.ts';
export type { CellKindEntry, SettingReference } from './registry.ts';
export { scriptSettings } from './script.ts';
export type { ScriptResult } from './script.ts';
export { balanceSettings } from './settings.ts';
export { structureSettings } from './structure.ts';
export type {
  BySpecies,
  ConservationLaw,
  ExactNumber,
  LinkageClass,
  MatrixTable,
  MinimalSiphon,
  StructureComparison,
  StructureCounts,
  StructureMatrices,
  StructureReaction,
  StructureResult,
  StructureSettings,
} from './structure.ts';
export { trajectorySettings } from './trajectory.ts';
export type { TrajectoryResult, TrajectorySettings, TrajectoryStatistics } from './trajectory.ts';
export { hypothesisClaims, verdictIds } from './verdict.ts';
export type {
  Applies,
  Citation,
  Hypothesis,
  HypothesisClaim,
  MinorPair,
  Verdict,
  VerdictId,
  VerdictKinetics,
  VerdictScope,
  Witness,
  WitnessBox,
  WitnessNumber,
} from './verdict.ts';
