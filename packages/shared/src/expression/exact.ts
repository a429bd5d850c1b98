import { rational } from '../network/index.ts';
import type { Rational } from '../network/network.ts';
import type { Expression } from './expression.ts';

/** Exact values beyond this many digits cost more than they tell; they are left to rounded arithmetic. */
const DIGIT_LIMIT = 4000;
const BITS_PER_DIGIT = 3.33;

/** The exact value of a name, null where it has none. */
export type ExactLookup = (name: string) => Rational | null;

/**
 * The exact value of an expression made of decimals and names with + - * / and integer powers; null where anything else
 * occurs, a name has no exact value, it divides by 0, or the value would have thousands of digits.
 */
export function exactValue(expression: Expression, lookup: ExactLookup): Rational | null {
  switch (expression.kind) {
    case 'number':
      return exactNumber(expression);
    case 'name':
      return lookup(expression.name);
    case 'negate': {
      const of = exactValue(expression.of, lookup);
      return of && rational.negate(of);
    }
    case 'binary': {
      const left = exactValue(expression.left, lookup);
      const right = left && exactValue(expression.right, lookup);
      return left && right && limited(operate(expression.operator, left, right));
    }
    default:
      return null;
  }
}

/** The exact value of a number: of its text (a decimal or a fraction "1/3") where it has one, else of the double. */
function exactNumber(number: Expression & { kind: 'number' }): Rational | null {
  if (number.text === undefined)
    return Number.isFinite(number.value) ? rational.ofNumber(number.value) : null;
  const [above = '', below] = number.text.split('/');
  const numerator = rational.ofDecimal(above);
  if (!numerator || below === undefined) return numerator;
  const denominator = rational.ofDecimal(below);
  return denominator && denominator.numerator !== 0n ? rational.divide(numerator, denominator) : null;
}

function operate(operator: string, left: Rational, right: Rational): Rational | null {
  switch (operator) {
    case '+':
      return rational.add(left, right);
    case '-':
      return rational.subtract(left, right);
    case '*':
      return rational.multiply(left, right);
    case '/':
      return right.numerator === 0n ? null : rational.divide(left, right);
    case '^':
      return power(left, right);
    default:
      return null;
  }
}

function power(base: Rational, exponent: Rational): Rational | null {
  const size = Number(exponent.numerator);
  if (!rational.isInteger(exponent) || Math.abs(size) * digits(base) > DIGIT_LIMIT) return null;
  return size < 0 && base.numerator === 0n ? null : rational.power(base, size);
}

function limited(value: Rational | null): Rational | null {
  return value && digits(value) <= DIGIT_LIMIT ? value : null;
}

/** About how many decimal digits the longer of numerator and denominator has. */
function digits(value: Rational): number {
  const length = (part: bigint) => part.toString(16).length;
  return (Math.max(length(value.numerator), length(value.denominator)) * 4) / BITS_PER_DIGIT;
}
