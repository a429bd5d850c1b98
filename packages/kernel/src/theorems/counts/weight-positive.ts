import { exactValue } from '@stillroom/shared/expression';
import type { Expression } from '@stillroom/shared/expression';
import { rational } from '../../exact/index.ts';
import { multiply, signAtInfinity } from '../polynomials/polynomial.ts';
import { zerosBetween } from '../polynomials/sturm.ts';
import type { ExactNames } from './fraction.ts';
import { fractionOf } from './fraction.ts';

/**
 * Whether a weight is proven positive for every n > from: it is built of positive parts, or it is a quotient of
 * polynomials without a zero there (Sturm's theorem). False says only that neither is seen.
 */
export function positiveBeyond(weight: Expression, names: ExactNames, from: number): boolean {
  if (builtOfPositives(weight, names)) return true;
  // With `min` or `max` the quotient that is read off holds for large n only.
  if (callsFunction(weight)) return false;
  const fraction = fractionOf(weight, 'n', names);
  if (fraction === null || fraction.above.length === 0) return false;
  const both = multiply(fraction.above, fraction.below);
  return signAtInfinity(both, 1) > 0 && zerosBetween(both, rational(BigInt(from)), null) === 0;
}

function builtOfPositives(expression: Expression, names: ExactNames): boolean {
  const value = exactValue(expression, (name) => (name === 'n' ? null : names(name)));
  if (value !== null) return value.numerator > 0n;
  const isPositive = (part: Expression): boolean => builtOfPositives(part, names);
  switch (expression.kind) {
    case 'number':
      return expression.value > 0;
    case 'name':
      return expression.name === 'n';
    case 'binary':
      if (expression.operator === '-' || expression.operator === '%') return false;
      return isPositive(expression.left) && (expression.operator === '^' || isPositive(expression.right));
    case 'call':
      if (expression.name === 'max') return expression.arguments.some(isPositive);
      return (
        (expression.name === 'min' || expression.name === 'sqrt') && expression.arguments.every(isPositive)
      );
    default:
      return false;
  }
}

function callsFunction(expression: Expression): boolean {
  switch (expression.kind) {
    case 'call':
      return true;
    case 'binary':
      return callsFunction(expression.left) || callsFunction(expression.right);
    case 'negate':
      return callsFunction(expression.of);
    default:
      return false;
  }
}
