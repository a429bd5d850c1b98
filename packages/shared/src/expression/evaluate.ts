import type { BinaryOperator, Comparison, Expression, FunctionName } from './expression.ts';
import { elementary } from './functions.ts';

/** The number that a name stands for. */
export type NumberLookup = (name: string) => number;

/**
 * The value of an expression in doubles, by our own elementary functions: the same bytes on every machine. Conditions
 * give 1 or 0. Outside a domain the result is NaN or infinite, as IEEE 754 has it.
 */
export function evaluate(expression: Expression, lookup: NumberLookup): number {
  switch (expression.kind) {
    case 'number':
      return expression.value;
    case 'name':
      return lookup(expression.name);
    case 'negate':
      return -evaluate(expression.of, lookup);
    case 'not':
      return evaluate(expression.of, lookup) === 0 ? 1 : 0;
    case 'logic': {
      const left = evaluate(expression.left, lookup) !== 0;
      if (left === (expression.operator === 'or')) return left ? 1 : 0;
      return evaluate(expression.right, lookup) !== 0 ? 1 : 0;
    }
    case 'compare':
      return compare(
        expression.operator,
        evaluate(expression.left, lookup),
        evaluate(expression.right, lookup),
      )
        ? 1
        : 0;
    case 'binary':
      return operate(
        expression.operator,
        evaluate(expression.left, lookup),
        evaluate(expression.right, lookup),
      );
    case 'call':
      return evaluateCall(expression.name, expression.arguments, lookup);
  }
}

/** The value of an operation. `%` has the sign of the divisor's absolute value: it is never negative. */
export function operate(operator: BinaryOperator, left: number, right: number): number {
  switch (operator) {
    case '+':
      return left + right;
    case '-':
      return left - right;
    case '*':
      return left * right;
    case '/':
      return left / right;
    case '%': {
      const rest = left % right;
      return rest < 0 ? rest + Math.abs(right) : rest;
    }
    case '^':
      return elementary.pow(left, right);
  }
}

export function compare(operator: Comparison, left: number, right: number): boolean {
  switch (operator) {
    case '==':
      return left === right;
    case '!=':
      return left !== right;
    case '<':
      return left < right;
    case '<=':
      return left <= right;
    case '>':
      return left > right;
    case '>=':
      return left >= right;
  }
}

function evaluateCall(name: FunctionName, values: readonly Expression[], lookup: NumberLookup): number {
  const [first, second, third] = values;
  if (name === 'if' && first && second && third) {
    return evaluate(evaluate(first, lookup) !== 0 ? second : third, lookup);
  }
  return applyFunction(
    name,
    values.map((value) => evaluate(value, lookup)),
  );
}

/** The value of a function at numbers; `round` goes half to even. */
export function applyFunction(name: FunctionName, values: readonly number[]): number {
  const [x = NaN, y = NaN, z = NaN] = values;
  switch (name) {
    case 'min':
      return Math.min(...values);
    case 'max':
      return Math.max(...values);
    case 'if':
      return x !== 0 ? y : z;
    case 'hill':
      return elementary.hill(x, y, z);
    default:
      return elementary[name](x);
  }
}
