export { describeNetwork } from './network.ts';
export { evaluateTrajectory } from './trajectory.ts';
export type { TrajectoryOptions } from './trajectory.ts';
export { analyseStructure } from './structure.ts';
export type { StructureOptions } from './structure.ts';
