export { contextOf, judgeAll } from './judge.ts';
export { checkWitness } from './witness/check.ts';
export type { WitnessCheck } from './witness/check.ts';
export { theorems } from './registry.ts';
export type { Judgement, Theorem } from './theorem.ts';
