import { printUnit } from '../units/unit.ts';
import type { Expression } from './expression.ts';
import type { ExpressionSyntax, RangeSyntax } from './syntax.ts';

/** How tightly each kind of expression binds; a part that binds less than its place asks for is put in brackets. */
const Binding = {
  or: 1,
  and: 2,
  not: 3,
  compare: 4,
  sum: 5,
  product: 6,
  sign: 7,
  power: 8,
  atom: 9,
} as const;

const operatorBinding = {
  '+': Binding.sum,
  '-': Binding.sum,
  '*': Binding.product,
  '/': Binding.product,
  '%': Binding.product,
  '^': Binding.power,
} as const;

const tight = new Set<string>(['*', '/', '^']);

/** Prints an expression so that reading it gives the same expression, with no more brackets than that needs. */
export function printExpression(expression: ExpressionSyntax | Expression): string {
  return expression.kind === 'measured' ? printMeasured(expression) : print(expression, 0);
}

/** `i = 1..L`. */
export function printRange(range: RangeSyntax): string {
  return `${range.name} = ${printExpression(range.first)}..${printExpression(range.last)}`;
}

type Printable = ExpressionSyntax | Expression;

function bindingOf(expression: Printable): number {
  switch (expression.kind) {
    case 'logic':
      return Binding[expression.operator];
    case 'not':
      return Binding.not;
    case 'compare':
      return Binding.compare;
    case 'binary':
      return operatorBinding[expression.operator];
    case 'negate':
      return Binding.sign;
    case 'number':
      return bindingOfNumber(numberText(expression));
    case 'measured':
      return 0;
    default:
      return Binding.atom;
  }
}

/** A resolved number may be negative or, where units were converted, an exact fraction. */
function bindingOfNumber(text: string): number {
  if (text.includes('/')) return Binding.product;
  return text.startsWith('-') ? Binding.sign : Binding.atom;
}

function numberText(expression: Printable & { kind: 'number' }): string {
  return expression.text ?? String('value' in expression ? expression.value : '');
}

function print(expression: Printable, least: number): string {
  const text = expression.kind === 'measured' ? printMeasured(expression) : printBare(expression);
  return bindingOf(expression) < Math.max(least, 1) ? `(${text})` : text;
}

function printMeasured(expression: ExpressionSyntax & { kind: 'measured' }): string {
  const of = expression.of.kind === 'number' ? expression.of.text : `(${printExpression(expression.of)})`;
  return `${of} ${printUnit(expression.unit)}`;
}

function printBare(expression: Exclude<Printable, { kind: 'measured' }>): string {
  switch (expression.kind) {
    case 'number':
      return numberText(expression);
    case 'name': {
      const indices = 'indices' in expression ? expression.indices : null;
      return indices ? `${expression.name}[${indices.map(printExpression).join(',')}]` : expression.name;
    }
    case 'negate':
      return `-${print(expression.of, Binding.sign)}`;
    case 'not':
      return `not ${print(expression.of, Binding.not)}`;
    case 'call':
      return `${expression.name}(${expression.arguments.map((value) => printExpression(value)).join(', ')})`;
    case 'sum':
      return `sum(${expression.ranges.map(printRange).join(', ')}, ${printExpression(expression.of)})`;
    case 'compare':
    case 'logic':
    case 'binary':
      return printInfix(expression);
  }
}

function printInfix(expression: Printable & { kind: 'compare' | 'logic' | 'binary' }): string {
  const { left, right, operator } = expression;
  const own = bindingOf(expression);
  // A power goes on to the right, a comparison to neither side, all others to the left.
  const isPower = operator === '^';
  const leftLeast = isPower || expression.kind === 'compare' ? own + 1 : own;
  const rightLeast = isPower ? Binding.sign : own + 1;
  const sign = tight.has(operator) ? operator : ` ${operator} `;
  return `${print(left, leftLeast)}${sign}${print(right, rightLeast)}`;
}
