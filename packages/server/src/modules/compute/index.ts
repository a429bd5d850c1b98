export { withResult } from './fair-copy.ts';
export { createCompute } from './module.ts';
export type { Compute, ComputeOptions } from './module.ts';
export type { Pool } from './pool/index.ts';
export { Planner } from './planner.ts';
export type { StandingCell } from './cell-state.ts';
export { readQueue } from './queue-view.ts';
export { ResultStore } from './results.ts';
export type { Known } from './results.ts';
