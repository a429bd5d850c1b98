import type { ClaimFunction, ClaimOperator } from '@stillroom/shared/paths';
import { reduceNumbers, valueAt } from '@stillroom/shared/paths';
import {
  add,
  compare,
  divide,
  isZero,
  multiply,
  negate,
  power,
  type Rational,
  rational,
  sign,
  subtract,
  toDouble,
  ZERO,
} from '../exact/index.ts';
import { ClaimMistake, type ClaimValue, Undecided } from './claim-value.ts';

type NumberValue = Extract<ClaimValue, { kind: 'exact' | 'measured' }>;

const exact = (value: Rational): NumberValue => ({ kind: 'exact', value });

function measured(value: number): NumberValue {
  if (!Number.isFinite(value)) throw new Undecided('A number on the way is too large, or none at all.');
  return { kind: 'measured', value };
}

/** The double nearest to a number of either kind. */
export const doubleOf = (value: NumberValue): number =>
  value.kind === 'exact' ? toDouble(value.value) : value.value;

/** A value that must be one number; lists, words and truth values are a mistake of the claim. */
export function numberIn(value: ClaimValue, where: string): NumberValue {
  if (value.kind === 'exact' || value.kind === 'measured') return value;
  if (value.kind === 'list') {
    throw new ClaimMistake(
      `${where} needs one number, and this is a list of ${value.entries.length}.`,
      null,
      'Make one of it with first, last, at, min, max, mean, sd, sum or count.',
    );
  }
  throw new ClaimMistake(
    `${where} needs a number, and this is ${value.kind === 'word' ? 'a word' : 'a truth value'}.`,
  );
}

/** Largest exponent of an exact power, and most bits that it may give. */
const largestExponent = 10_000;
const mostBits = 1_000_000;

function bits(value: Rational): number {
  const longer = [value.numerator, value.denominator].map((part) => part.toString(16).length);
  return 4 * Math.max(...longer);
}

/** Repeated squaring, so that bytes do not depend on the machine's power function. */
function doublePower(base: number, exponent: number): number {
  let result = 1;
  let square = base;
  for (let left = Math.abs(exponent); left > 0; left = Math.floor(left / 2)) {
    if (left % 2 === 1) result *= square;
    square *= square;
  }
  return exponent < 0 ? 1 / result : result;
}

function raise(base: NumberValue, exponent: NumberValue): NumberValue {
  const size = doubleOf(exponent);
  if (size === 0.5) return measured(Math.sqrt(doubleOf(base)));
  if (!Number.isSafeInteger(size) || Math.abs(size) > largestExponent) {
    throw new ClaimMistake(
      `An exponent is a whole number up to ${largestExponent}, or 0.5 for the square root.`,
    );
  }
  if (base.kind === 'measured') return measured(doublePower(base.value, size));
  if (isZero(base.value) && size < 0) throw new Undecided('It divides by 0.');
  if (bits(base.value) * Math.abs(size) > mostBits) throw new Undecided('A number on the way is too large.');
  return exact(power(base.value, size));
}

const doubleOperators: Readonly<Record<Exclude<ClaimOperator, '^'>, (a: number, b: number) => number>> = {
  '+': (a, b) => a + b,
  '-': (a, b) => a - b,
  '*': (a, b) => a * b,
  '/': (a, b) => a / b,
};
const exactOperators: Readonly<Record<Exclude<ClaimOperator, '^'>, (a: Rational, b: Rational) => Rational>> =
  {
    '+': add,
    '-': subtract,
    '*': multiply,
    '/': divide,
  };

/** Exact as long as both sides are, else in double precision. */
export function calculate(operator: ClaimOperator, left: NumberValue, right: NumberValue): NumberValue {
  if (operator === '^') return raise(left, right);
  if (operator === '/' && doubleOf(right) === 0) throw new Undecided('It divides by 0.');
  return left.kind === 'exact' && right.kind === 'exact'
    ? exact(exactOperators[operator](left.value, right.value))
    : measured(doubleOperators[operator](doubleOf(left), doubleOf(right)));
}

/** −a. */
export const opposite = (value: NumberValue): NumberValue =>
  value.kind === 'exact' ? exact(negate(value.value)) : measured(-value.value);

function listIn(value: ClaimValue | undefined, name: string): NumberValue[] {
  if (value?.kind !== 'list') {
    throw new ClaimMistake(`${name} needs a list, and this is a single value.`, null, `Leave ${name} out.`);
  }
  if (value.entries.length === 0) throw new Undecided(`${name} of an empty list is nothing.`);
  return value.entries.map((entry) => numberIn(entry, `An entry for ${name}`));
}

function extreme(values: readonly NumberValue[], wanted: 1 | -1): NumberValue {
  const allExact = values.flatMap((value) => (value.kind === 'exact' ? [value.value] : []));
  if (allExact.length === values.length) {
    return exact(allExact.reduce((best, value) => (compare(value, best) === wanted ? value : best)));
  }
  return measured(reduceNumbers(wanted === 1 ? 'max' : 'min', values.map(doubleOf)));
}

function total(values: readonly NumberValue[]): NumberValue {
  const allExact = values.flatMap((value) => (value.kind === 'exact' ? [value.value] : []));
  return allExact.length === values.length
    ? exact(allExact.reduce(add, ZERO))
    : measured(reduceNumbers('sum', values.map(doubleOf)));
}

function absolute(value: NumberValue): NumberValue {
  if (value.kind === 'measured') return measured(Math.abs(value.value));
  return sign(value.value) < 0 ? opposite(value) : value;
}

function at(course: ClaimValue | undefined, time: ClaimValue | undefined): ClaimValue {
  const values = listIn(course, 'at').map(doubleOf);
  const times = course?.kind === 'list' ? course.times : null;
  if (times === null) throw new ClaimMistake('at needs a course in time, and this list is none.');
  const when = doubleOf(numberIn(time ?? exact(ZERO), 'The time of at'));
  const found = valueAt(times, values, when);
  if (found === null) {
    throw new ClaimMistake(
      `The course runs from ${times[0]} to ${times.at(-1)}, so it has no value at ${when}.`,
    );
  }
  return measured(found);
}

/** Calls one of the functions of claims. */
export function callFunction(name: ClaimFunction, given: readonly ClaimValue[]): ClaimValue {
  const [first, second] = given;
  const several = (): NumberValue[] =>
    given.length === 1 ? listIn(first, name) : given.map((value) => numberIn(value, name));
  switch (name) {
    case 'abs':
      return absolute(numberIn(first ?? exact(ZERO), 'abs'));
    case 'min':
      return extreme(several(), -1);
    case 'max':
      return extreme(several(), 1);
    case 'sum':
      return total(several());
    case 'mean': {
      const values = listIn(first, 'mean');
      return calculate('/', total(values), exact(rational(BigInt(values.length))));
    }
    case 'sd':
      return measured(reduceNumbers('sd', listIn(first, 'sd').map(doubleOf)));
    case 'first':
    case 'last': {
      if (first?.kind === 'list' && first.entries.length > 0) {
        return first.entries.at(name === 'first' ? 0 : -1) ?? first;
      }
      return listIn(first, name)[0] ?? exact(ZERO);
    }
    case 'count':
      if (first?.kind !== 'list') throw new ClaimMistake('count needs a list, and this is a single value.');
      return exact(rational(BigInt(first.entries.length)));
    case 'at':
      return at(first, second);
  }
}
