export { claimFunctions, claimPaths, parseClaim } from './claim-expression.ts';
export type {
  ClaimComparison,
  ClaimExpression,
  ClaimFunction,
  ClaimOperator,
  ClaimTerm,
} from './claim-expression.ts';
export { isMeasuredPlace, unitAt } from './nature.ts';
export { parsePath, printPath } from './path.ts';
export type { Path, PathStep } from './path.ts';
export { findWoven, mathAt, wovenAt } from './prose-spans.ts';
export type { MathSpan, WovenSpan } from './prose-spans.ts';
export { lineAndColumn } from './reading.ts';
export type { Misreading, Reading } from './reading.ts';
export { resolvePath } from './resolve.ts';
export type { Resolution } from './resolve.ts';
export { parseWoven } from './woven.ts';
export type { Woven, WovenFilter } from './woven.ts';
export { numberText, unitText } from './number-text.ts';
export type { NumberStyle } from './number-text.ts';
export { reduceNumbers, valueAt } from './reduce.ts';
export type { Reduction } from './reduce.ts';
export { wovenText } from './woven-text.ts';
export type { WovenContext, WovenText } from './woven-text.ts';
