import { productIsOne, productText } from './power-products.ts';
import type { Rational } from '../exact/index.ts';
import { add, multiply, ONE, primitiveWithPositiveLead, rational, ZERO } from '../exact/index.ts';
import type { TheoremContext } from '../theorems/context.ts';
import { treeConstants } from './tree-constants.ts';
import type { TreePolynomial } from './tree-polynomials.ts';
import { treePolynomials } from './tree-polynomials.ts';

/** One condition on the constants: both sides as products of constants and as exact numbers. */
export interface BalanceCondition {
  /** "k2^2 = k1*k3", or in tree constants "K(2 A)*K(2 B) = K(A + B)^2". */
  readonly expression: string;
  /** Exact values of both sides; null where constants are missing or the number would be too long to read. */
  readonly left: string | null;
  readonly right: string | null;
  /** Null where constants are missing. */
  readonly holds: boolean | null;
}

/** A condition with the vector u it belongs to: ∏ K_y^{u_y} = 1, u by complex. */
export interface ComplexCondition extends BalanceCondition {
  readonly exponents: readonly bigint[];
}

/** A factor of a side: a sum of products of arrows with a positive exponent, and its value where known. */
interface Factor {
  readonly text: string;
  readonly value: Rational | null;
  readonly exponent: number;
}

/**
 * The δ conditions ∏ K_y^{u_y} = 1 for complex balance, u running through a lattice basis of ker Y ∩ im I_a. Null where
 * the network is not weakly reversible (no constants are complex balanced) or too large.
 * Horn 1972; Craciun, Dickenstein, Shiu, Sturmfels 2009.
 */
export function complexConditions(context: TheoremContext): ComplexCondition[] | null {
  return context.memo('complex conditions', () => {
    const vectors = context.weaklyReversible ? context.deficiencyVectors : null;
    if (vectors === null) return null;
    if (vectors.length === 0) return [];
    const constants = context.exactConstants;
    const trees = constants === null ? null : treeConstants(context, constants);
    if (constants !== null && trees === null) return null;
    const polynomials = classPolynomials(context);
    return vectors.map((vector) => {
      const exponents = primitiveWithPositiveLead(vector);
      const [left, right] = sides(context, exponents, polynomials, trees);
      const powers = exponents.map((exponent, y) => ({ base: trees?.[y] ?? 1n, exponent }));
      return {
        expression: `${productOf(left)} = ${productOf(right)}`,
        left: trees && valueOf(left),
        right: trees && valueOf(right),
        holds: trees && productIsOne(powers),
        exponents,
      };
    });
  });
}

function classPolynomials(context: TheoremContext): ReadonlyMap<number, TreePolynomial> | null {
  const all = new Map<number, TreePolynomial>();
  for (const { complexes } of context.linkageClasses) {
    const own = treePolynomials(context, complexes);
    if (own === null) return null;
    own.forEach((polynomial, complex) => all.set(complex, polynomial));
  }
  return all;
}

function sides(
  context: TheoremContext,
  exponents: readonly bigint[],
  polynomials: ReadonlyMap<number, TreePolynomial> | null,
  trees: readonly bigint[] | null,
): [Factor[], Factor[]] {
  const factors =
    polynomials === null
      ? exponents.flatMap((exponent, y): Factor[] =>
          exponent === 0n
            ? []
            : [
                {
                  text: `K(${context.complexLabel(y)})`,
                  value: trees && rational(trees[y]!),
                  exponent: Number(exponent),
                },
              ],
        )
      : cancelled(context, exponents, polynomials);
  const left = factors.filter(({ exponent }) => exponent > 0);
  const right = factors
    .filter(({ exponent }) => exponent < 0)
    .map((factor) => ({ ...factor, exponent: -factor.exponent }));
  return [left, right];
}

/** Takes out of every polynomial the constants common to all of its terms, adds exponents, drops what cancels. */
function cancelled(
  context: TheoremContext,
  exponents: readonly bigint[],
  polynomials: ReadonlyMap<number, TreePolynomial>,
): Factor[] {
  const single = new Map<number, number>();
  const sums = new Map<string, { terms: TreePolynomial; exponent: number }>();
  exponents.forEach((power, y) => {
    const exponent = Number(power);
    const polynomial = polynomials.get(y)!;
    if (exponent === 0) return;
    const common = polynomial[0]!.filter((arrow) => polynomial.every((term) => term.includes(arrow)));
    for (const arrow of common) single.set(arrow, (single.get(arrow) ?? 0) + exponent);
    const rest = polynomial.map((term) => term.filter((arrow) => !common.includes(arrow)));
    if (rest.length === 1) return;
    const key = rest
      .map((term) => term.join('*'))
      .sort()
      .join('+');
    sums.set(key, { terms: rest, exponent: (sums.get(key)?.exponent ?? 0) + exponent });
  });
  const factors = [...single]
    .sort(([a], [b]) => a - b)
    .map(([arrow, exponent]): Factor => ({
      text: nameOf(context, arrow),
      value: constantOf(context, arrow),
      exponent,
    }));
  for (const { terms, exponent } of sums.values()) {
    factors.push({
      text: `(${terms.map((term) => termText(context, term)).join(' + ')})`,
      value: sumOf(context, terms),
      exponent,
    });
  }
  return factors.filter(({ exponent }) => exponent !== 0);
}

function nameOf(context: TheoremContext, arrow: number): string {
  return context.constants.names[arrow]!;
}

function termText(context: TheoremContext, term: readonly number[]): string {
  return term.length === 0 ? '1' : term.map((arrow) => nameOf(context, arrow)).join('*');
}

function constantOf(context: TheoremContext, arrow: number): Rational | null {
  return context.exactConstants?.[arrow] ?? null;
}

function sumOf(context: TheoremContext, terms: TreePolynomial): Rational | null {
  if (context.exactConstants === null) return null;
  return terms.reduce(
    (sum, term) =>
      add(
        sum,
        term.reduce((product, arrow) => multiply(product, constantOf(context, arrow)!), ONE),
      ),
    ZERO,
  );
}

function productOf(factors: readonly Factor[]): string {
  if (factors.length === 0) return '1';
  return factors.map(({ text, exponent }) => (exponent === 1 ? text : `${text}^${exponent}`)).join('*');
}

function valueOf(factors: readonly Factor[]): string | null {
  const known = factors.flatMap(({ value, exponent }) => (value === null ? [] : [{ value, exponent }]));
  return known.length === factors.length ? productText(known) : null;
}
