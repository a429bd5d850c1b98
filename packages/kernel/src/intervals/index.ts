export { inverse, solveDense } from './dense.ts';
export {
  add,
  certainSign,
  disjoint,
  enclose,
  insideOf,
  multiply,
  NAUGHT,
  point,
  power,
  scale,
  subtract,
} from './interval.ts';
export type { Interval } from './interval.ts';
export { verifiedBox } from './krawczyk.ts';
export type { IntervalSystem } from './krawczyk.ts';
