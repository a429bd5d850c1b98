export type { Pool, PoolOptions, RunOptions, WorkerView } from './types.ts';
