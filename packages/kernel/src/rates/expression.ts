import type { Expression, FunctionName } from '@stillroom/shared/expression';
import { type Graph, hostNumber, type Node } from '../program/index.ts';
import { RateError } from './error.ts';

/** What a name stands for in an expression; null where it stands for nothing. */
export type Resolve = (name: string) => Node | null;

/** The node of an expression. Comparisons and logical operators give 1 or 0. */
export function expressionNode(graph: Graph, expression: Expression, resolve: Resolve): Node {
  const node = (part: Expression): Node => expressionNode(graph, part, resolve);
  switch (expression.kind) {
    case 'number':
      return graph.constant(expression.value);
    case 'name': {
      const found = resolve(expression.name);
      if (found === null) throw new RateError(`The network has nothing called "${expression.name}".`);
      return found;
    }
    case 'negate':
      return graph.negate(node(expression.of));
    case 'not':
      return graph.subtract(graph.constant(1), truth(graph, node(expression.of)));
    case 'binary':
      return binaryNode(graph, expression.operator, node(expression.left), node(expression.right));
    case 'compare':
      return compareNode(graph, expression.operator, node(expression.left), node(expression.right));
    case 'logic': {
      const left = truth(graph, node(expression.left));
      const right = truth(graph, node(expression.right));
      return expression.operator === 'and' ? graph.multiply(left, right) : graph.max(left, right);
    }
    case 'call':
      return callNode(graph, expression.name, expression.arguments.map(node));
  }
}

function binaryNode(graph: Graph, operator: '+' | '-' | '*' | '/' | '%' | '^', a: Node, b: Node): Node {
  switch (operator) {
    case '+':
      return graph.add(a, b);
    case '-':
      return graph.subtract(a, b);
    case '*':
      return graph.multiply(a, b);
    case '/':
      return graph.divide(a, b);
    case '%':
      return graph.subtract(a, graph.multiply(b, graph.floor(graph.divide(a, b))));
    case '^':
      return power(graph, a, b);
  }
}

function compareNode(graph: Graph, operator: string, a: Node, b: Node): Node {
  switch (operator) {
    case '<':
      return graph.less(a, b);
    case '<=':
      return graph.lessEqual(a, b);
    case '>':
      return graph.less(b, a);
    case '>=':
      return graph.lessEqual(b, a);
    case '==':
      return graph.equal(a, b);
    default:
      return graph.subtract(graph.constant(1), graph.equal(a, b));
  }
}

/** 1 where the number is not 0, else 0. */
function truth(graph: Graph, node: Node): Node {
  return graph.subtract(graph.constant(1), graph.equal(node, graph.constant(0)));
}

function callNode(graph: Graph, name: FunctionName, given: readonly Node[]): Node {
  const a = given[0]!;
  switch (name) {
    case 'sqrt':
      return graph.sqrt(a);
    case 'abs':
      return graph.abs(a);
    case 'floor':
      return graph.floor(a);
    case 'ceil':
      return graph.ceil(a);
    case 'min':
      return given.slice(1).reduce((least, next) => graph.min(least, next), a);
    case 'max':
      return given.slice(1).reduce((most, next) => graph.max(most, next), a);
    case 'if':
      return graph.select(a, given[1]!, given[2]!);
    case 'hill':
      return hill(graph, a, given[1]!, given[2]!);
    default:
      return graph.call(hostNumber(name), a);
  }
}

/** a^b; an exponent that is a whole number in the text becomes multiplications. */
function power(graph: Graph, a: Node, b: Node): Node {
  const exponent = constantOf(graph, b);
  if (exponent !== null && Number.isInteger(exponent) && Math.abs(exponent) <= 64) {
    const whole = integerPower(graph, a, Math.abs(exponent));
    return exponent < 0 ? graph.divide(graph.constant(1), whole) : whole;
  }
  return graph.call(hostNumber('pow'), a, b);
}

/** x^n by repeated squaring, for a whole n ≥ 0. */
export function integerPower(graph: Graph, x: Node, n: number): Node {
  let result = graph.constant(1);
  let square = x;
  for (let rest = n; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = graph.multiply(result, square);
    if (rest > 1) square = graph.multiply(square, square);
  }
  return result;
}

/**
 * x^n / (K^n + x^n). Unless n is a whole number of the text, a negative x (round-off around 0) counts as 0, since the
 * power is not defined there.
 */
function hill(graph: Graph, x: Node, half: Node, n: Node): Node {
  const exponent = constantOf(graph, n);
  const whole = exponent !== null && Number.isInteger(exponent);
  const base = whole ? x : graph.max(x, graph.constant(0));
  const numerator = power(graph, base, n);
  return graph.divide(numerator, graph.add(power(graph, half, n), numerator));
}

function constantOf(graph: Graph, node: Node): number | null {
  return graph.isConstantNode(node) ? graph.value(node) : null;
}
