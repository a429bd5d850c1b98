export { contextOf, judgeAll } from './judge.ts';
export { theorems } from './registry.ts';
export type { Judgement, Theorem } from './theorem.ts';
