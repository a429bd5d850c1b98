import type { ExpressionSyntax } from '../../expression/syntax.ts';
import { Failure, makeIt } from '../failure.ts';
import { nearest } from '../nearest.ts';

/** Values of the indices in scope, by slot. */
export type IndexValues = readonly number[];
/** An integer expression made ready: called once per member of a family. */
export type IntegerFunction = (values: IndexValues) => number;
/** Slot of each index in scope. */
export type Slots = ReadonlyMap<string, number>;

/** The integer value of a name that is no index; throws Failure at `at` where it has none. */
export type IntegerNames = (name: string, at: ExpressionSyntax) => number;

/**
 * Makes a function of an integer expression over indices and integer lets. `%` is never negative, `/` must divide
 * without rest, conditions give 1 or 0. Throws Failure at what cannot be an integer; the function throws Failure where its
 * value is none.
 */
export function compileInteger(
  expression: ExpressionSyntax,
  slots: Slots,
  names: IntegerNames,
): IntegerFunction {
  const compile = (part: ExpressionSyntax): IntegerFunction => compileInteger(part, slots, names);
  switch (expression.kind) {
    case 'number': {
      const value = Number(expression.text);
      if (!Number.isSafeInteger(value)) throw notWhole(expression, expression.text);
      return () => value;
    }
    case 'name': {
      const slot = expression.indices ? undefined : slots.get(expression.name);
      if (slot !== undefined) return (values) => values[slot] as number;
      if (expression.indices) throw notWhole(expression, `${expression.name}[…]`);
      const value = names(expression.name, expression);
      return () => value;
    }
    case 'negate': {
      const of = compile(expression.of);
      return (values) => 0 - of(values);
    }
    case 'not': {
      const of = compile(expression.of);
      return (values) => (of(values) === 0 ? 1 : 0);
    }
    case 'binary':
      return compileOperation(expression, compile(expression.left), compile(expression.right));
    case 'compare':
      return compileComparison(expression.operator, compile(expression.left), compile(expression.right));
    case 'logic': {
      const left = compile(expression.left);
      const right = compile(expression.right);
      return expression.operator === 'and'
        ? (values) => (left(values) !== 0 && right(values) !== 0 ? 1 : 0)
        : (values) => (left(values) !== 0 || right(values) !== 0 ? 1 : 0);
    }
    case 'call':
      return compileCall(expression, expression.arguments.map(compile));
    case 'measured':
      throw new Failure(expression.from, expression.to, 'A whole number without unit belongs here.');
    case 'sum':
      throw new Failure(expression.from, expression.to, 'sum cannot stand in an index or a bound.');
  }
}

function notWhole(at: ExpressionSyntax, shown: string | number): Failure {
  return new Failure(at.from, at.to, `A whole number belongs here; ${shown} is none.`);
}

function compileOperation(
  expression: ExpressionSyntax & { kind: 'binary' },
  left: IntegerFunction,
  right: IntegerFunction,
): IntegerFunction {
  switch (expression.operator) {
    case '+':
      return (values) => left(values) + right(values);
    case '-':
      return (values) => left(values) - right(values);
    case '*':
      return (values) => left(values) * right(values);
    case '%':
      return (values) => {
        const divisor = Math.abs(nonZero(right(values), expression));
        const rest = left(values) % divisor;
        return rest < 0 ? rest + divisor : rest;
      };
    case '/':
      return (values) => {
        const quotient = left(values) / nonZero(right(values), expression);
        if (!Number.isInteger(quotient)) throw notWhole(expression, quotient);
        return quotient;
      };
    case '^':
      return (values) => integerPower(left(values), right(values), expression);
  }
}

function nonZero(value: number, at: ExpressionSyntax): number {
  if (value === 0) throw new Failure(at.from, at.to, 'This divides by 0.');
  return value;
}

function integerPower(base: number, exponent: number, at: ExpressionSyntax): number {
  if (exponent < 0) throw notWhole(at, `a power of ${exponent}`);
  let result = 1;
  let factor = base;
  for (let left = exponent; left > 0; left = Math.floor(left / 2)) {
    if (left % 2 === 1) result *= factor;
    factor *= factor;
  }
  return result;
}

function compileComparison(operator: string, left: IntegerFunction, right: IntegerFunction): IntegerFunction {
  switch (operator) {
    case '==':
      return (values) => (left(values) === right(values) ? 1 : 0);
    case '!=':
      return (values) => (left(values) !== right(values) ? 1 : 0);
    case '<':
      return (values) => (left(values) < right(values) ? 1 : 0);
    case '<=':
      return (values) => (left(values) <= right(values) ? 1 : 0);
    case '>':
      return (values) => (left(values) > right(values) ? 1 : 0);
    default:
      return (values) => (left(values) >= right(values) ? 1 : 0);
  }
}

function compileCall(
  call: ExpressionSyntax & { kind: 'call' },
  parts: readonly IntegerFunction[],
): IntegerFunction {
  const [first, second, third] = parts;
  if (call.name === 'min') return (values) => Math.min(...parts.map((part) => part(values)));
  if (call.name === 'max') return (values) => Math.max(...parts.map((part) => part(values)));
  if (call.name === 'abs' && first) return (values) => Math.abs(first(values));
  if (call.name === 'if' && first && second && third) {
    return (values) => (first(values) !== 0 ? second(values) : third(values));
  }
  throw new Failure(call.from, call.to, `${call.name} cannot stand in an index or a bound.`, {
    hint: 'Use + - * / % ^, comparisons, min, max, abs and if.',
  });
}

/** Reads the integer value of lets on demand, each once. About names in lines with an error nothing is told. */
export function integerLets(
  lets: ReadonlyMap<string, ExpressionSyntax>,
  inBrokenLines: ReadonlySet<string>,
): IntegerNames {
  const known = new Map<string, number>();
  const open = new Set<string>();
  const names: IntegerNames = (name, at) => {
    const value = known.get(name);
    if (value !== undefined) return value;
    const definition = lets.get(name);
    if (!definition) throw unknownInteger(name, at, lets.keys(), inBrokenLines.has(name));
    // A long chain of lets would otherwise overflow the stack.
    if (open.has(name) || open.size > 100)
      throw new Failure(at.from, at.to, `${name} is defined through itself.`);
    open.add(name);
    try {
      const result = compileInteger(definition, new Map(), names)([]);
      if (!Number.isSafeInteger(result)) throw notWhole(at, name);
      known.set(name, result);
      return result;
    } catch (thrown) {
      if (!(thrown instanceof Failure)) throw thrown;
      throw new Failure(at.from, at.to, `${name} is not a whole number, which belongs here.`, {
        hint: thrown.message,
      });
    } finally {
      open.delete(name);
    }
  };
  return names;
}

function unknownInteger(
  name: string,
  at: ExpressionSyntax,
  candidates: Iterable<string>,
  silent: boolean,
): Failure {
  const meant = nearest(name, candidates);
  return new Failure(at.from, at.to, `${name} has no whole number as its value.`, {
    hint: `Give it one: let ${name} = 10.`,
    repairs: meant ? [makeIt(meant, at.from, at.to)] : [],
    silent,
  });
}
