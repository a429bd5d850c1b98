export { isLong } from './places.ts';
export { createPool } from './pool.ts';
export type { Pool, PoolOptions, RunOptions, WorkerView } from './types.ts';
