export { functionNames } from './expression.ts';
export type { BinaryOperator, Comparison, Expression, FunctionName } from './expression.ts';
