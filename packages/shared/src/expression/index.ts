export { functionNames } from './expression.ts';
export type { BinaryOperator, Comparison, Expression, FunctionName } from './expression.ts';
export { applyFunction, evaluate } from './evaluate.ts';
export type { NumberLookup } from './evaluate.ts';
export { exactValue } from './exact.ts';
export type { ExactLookup } from './exact.ts';
export { elementary } from './functions.ts';
export { freeNames, partsOf } from './names.ts';
export { printExpression } from './print.ts';
