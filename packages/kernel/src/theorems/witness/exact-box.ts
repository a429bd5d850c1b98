import type { Rational } from '../../exact/index.ts';
import {
  add,
  compare,
  fromDouble,
  isZero,
  multiply,
  negate,
  ONE,
  sign,
  subtract,
  toDouble,
  ZERO,
} from '../../exact/index.ts';
import { inverse } from '../../intervals/index.ts';

/** An interval with exact rational ends: no rounding anywhere, so nothing has to be trusted about the host. */
export interface ExactInterval {
  readonly low: Rational;
  readonly high: Rational;
}

/** A polynomial equation Σ coefficient · x^exponents = constant. */
export interface Equation {
  readonly terms: readonly { readonly coefficient: Rational; readonly exponents: readonly number[] }[];
  readonly constant: Rational;
}

/**
 * Whether a box holds exactly one zero of a square system, with a regular Jacobian: the Krawczyk operator maps the box into
 * its interior, in exact arithmetic. The preconditioner comes from doubles; any one that works is as good as another.
 */
export function holdsOneZero(equations: readonly Equation[], box: readonly ExactInterval[]): boolean {
  const centre = box.map(({ low, high }) => fromDouble((toDouble(low) + toDouble(high)) / 2));
  const jacobian = equations.map((equation) => box.map((_, k) => slope(equation, box, k)));
  const approximate = inverse(
    jacobian.map((row) =>
      row.map(({ low, high }, k) => ((toDouble(low) + toDouble(high)) / 2) * toDouble(centre[k]!)),
    ),
  );
  if (approximate === null) return false;
  // Rows of the preconditioner belong to x / centre.
  const c = approximate.map((row, i) =>
    row.map((entry) => multiply(fromDouble(Math.fround(entry)), centre[i]!)),
  );
  const values = equations.map((equation) => valueAt(equation, centre));
  return box.every((side, i) => {
    let low = centre[i]!;
    let high = centre[i]!;
    const shift = c[i]!.reduce((sum, weight, j) => add(sum, multiply(weight, values[j]!)), ZERO);
    low = subtract(low, shift);
    high = subtract(high, shift);
    for (let k = 0; k < box.length; k++) {
      let entry: ExactInterval = { low: ZERO, high: ZERO };
      for (let j = 0; j < box.length; j++) entry = plus(entry, times(exactly(c[i]![j]!), jacobian[j]![k]!));
      const identity = exactly(i === k ? ONE : ZERO);
      const defect = plus(identity, { low: negate(entry.high), high: negate(entry.low) });
      const spread = { low: subtract(box[k]!.low, centre[k]!), high: subtract(box[k]!.high, centre[k]!) };
      const part = times(defect, spread);
      low = add(low, part.low);
      high = add(high, part.high);
    }
    return compare(low, side.low) > 0 && compare(high, side.high) < 0;
  });
}

function exactly(value: Rational): ExactInterval {
  return { low: value, high: value };
}

function plus(a: ExactInterval, b: ExactInterval): ExactInterval {
  return { low: add(a.low, b.low), high: add(a.high, b.high) };
}

function times(a: ExactInterval, b: ExactInterval): ExactInterval {
  const products = [
    multiply(a.low, b.low),
    multiply(a.low, b.high),
    multiply(a.high, b.low),
    multiply(a.high, b.high),
  ];
  products.sort(compare);
  return { low: products[0]!, high: products[3]! };
}

function valueAt({ terms, constant }: Equation, x: readonly Rational[]): Rational {
  return terms.reduce(
    (sum, { coefficient, exponents }) =>
      add(
        sum,
        exponents.reduce((product, exponent, i) => multiplied(product, x[i]!, exponent), coefficient),
      ),
    negate(constant),
  );
}

function multiplied(value: Rational, factor: Rational, times: number): Rational {
  let product = value;
  for (let k = 0; k < times; k++) product = multiply(product, factor);
  return product;
}

/** ∂/∂x_k on a box of positive numbers. */
function slope({ terms }: Equation, box: readonly ExactInterval[], k: number): ExactInterval {
  let sum: ExactInterval = { low: ZERO, high: ZERO };
  for (const { coefficient, exponents } of terms) {
    const own = exponents[k]!;
    if (own === 0 || isZero(coefficient)) continue;
    let low = ONE;
    let high = ONE;
    exponents.forEach((exponent, i) => {
      const count = i === k ? exponent - 1 : exponent;
      low = multiplied(low, box[i]!.low, count);
      high = multiplied(high, box[i]!.high, count);
    });
    const factor = multiply(coefficient, { numerator: BigInt(own), denominator: 1n });
    const [first, second] = sign(factor) > 0 ? [low, high] : [high, low];
    sum = plus(sum, { low: multiply(factor, first), high: multiply(factor, second) });
  }
  return sum;
}
