import type { Hypothesis } from '@stillroom/shared/cells';
import { freeNames } from '@stillroom/shared/expression';
import type { Rational } from '../../exact/index.ts';
import { add, compare, divide, formatRational, multiply, ONE, sign, ZERO } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import type { Polynomial } from '../polynomials/polynomial.ts';
import { degree, multiply as multiplyPolynomials, scale, subtract } from '../polynomials/polynomial.ts';
import type { Fraction } from './fraction.ts';
import { multiplyFractions, rootBound } from './fraction.ts';
import { leavingArrows, rateAt, rateFraction, shifted } from './site-rates.ts';

/** The hypotheses that rates factorise and that z exists, and the weight in words where it is known. */
export interface FactorisedRates {
  readonly hypotheses: readonly Hypothesis[];
  readonly weight: string | null;
  /** Whether rates were compared only up to the units that the start has. */
  readonly fromStart: boolean;
}

/**
 * Checks u(m|n) = v(m) w(n − m)/w(n) site by site and then the balance of v and z. With mass action or weights the rates
 * factorise by their form, v the constants, w(n) = 1/∏ θ(j), and the balance is complex balance. With laws, w follows from
 * the rates of the smallest size, exactly, for every n that can occur: up to the total of a start, or for all n where the
 * laws are rational functions of n.
 */
export function factorisedRates(context: TheoremContext): FactorisedRates {
  if (context.kinetics.otherLaw === null && context.kinetics.unlikeInCounts === null) return byForm(context);
  const elsewhere = lawOfAnotherSite(context);
  if (elsewhere !== null) return stated(elsewhere, false);
  const total = startTotal(context);
  const constants = context.arrows.map(() => ONE);
  for (const [species, name] of context.species.entries()) {
    const found = fitSite(context, species, name, total, constants);
    if (found !== null) return stated(found.why, found.holds);
  }
  const factorise: Hypothesis = {
    claim: 'rates factorise',
    text:
      total === null
        ? `${FACTORISE} This holds for every n, the laws being rational functions of n.`
        : FACTORISE,
    holds: true,
  };
  return {
    hypotheses: [factorise, balanced(context, constants, total)],
    weight: null,
    fromStart: total !== null,
  };
}

const FACTORISE = 'The rates factorise: u(m|n) = v(m) w(n − m)/w(n) at every site.';

function stated(reason: string, holds: boolean | null): FactorisedRates {
  return {
    hypotheses: [{ claim: 'rates factorise', text: `${FACTORISE} ${reason}`, holds }],
    weight: null,
    fromStart: false,
  };
}

function byForm(context: TheoremContext): FactorisedRates {
  const form: Hypothesis = {
    claim: 'rates factorise',
    text: `${FACTORISE} Mass action and weights have this form, with w(n) = 1/∏ θ(j).`,
    holds: true,
  };
  const balance = context.verdict('complex-balance');
  const weighted = context.network.weights.size > 0;
  return {
    hypotheses: [
      form,
      {
        claim: 'complex balanced',
        text: 'Some z > 0 balances what leaves and what enters each site, for every size m: the rate equations are complex balanced.',
        holds: { yes: true, no: false, undecided: null }[balance.applies],
      },
    ],
    weight: weighted ? 'w_i(n) = 1/∏_{j≤n} θ_i(j)' : 'w(n) = 1/n!',
    fromStart: false,
  };
}

/** Units up to which rates are compared one by one. */
const MOST_UNITS = 400;

/** Largest number of units on one site: the total of a start in which all is conserved; null where it is not known. */
function startTotal(context: TheoremContext): number | null {
  const start = context.exactStart;
  if (start === null) return null;
  const total = start.reduce(add, ZERO);
  return total.denominator === 1n && total.numerator <= BigInt(MOST_UNITS) ? Number(total.numerator) : null;
}

/** A sentence that names a law which depends on another site, with two states that show it; null where none does. */
function lawOfAnotherSite(context: TheoremContext): string | null {
  const { network, structure } = context;
  for (let reaction = 0; reaction < structure.reactions.count; reaction++) {
    const law = network.laws[network.reactions.law[structure.reactions.source[reaction]!]!];
    if (law === undefined) continue;
    const arrow = structure.reactions.arrow[reaction]!;
    const own = context.terms(context.arrows[arrow]!.from)[0]!.species;
    const others = freeNames(law.expression).filter(
      (name) => name !== context.species[own] && context.species.includes(name),
    );
    for (const other of others) {
      const states = [0n, 1n, 2n].map((n) => rateAt(context, arrow, BigInt(PROBE), new Map([[other, n]])));
      const [first] = states;
      if (first !== null && states.some((value) => value !== null && compare(value, first!) !== 0))
        return `The rate of ${context.arrowLabel(arrow)} depends on ${other} as well.`;
    }
  }
  return null;
}

/** Units on the site itself while another one is varied. */
const PROBE = 3;

interface Misfit {
  readonly why: string;
  readonly holds: false | null;
}

/**
 * Compares the rates out of one site: with w from the smallest size m₀, every other size m = q m₀ has to leave at the rate
 * c ∏_{k<q} u(m₀|n − k m₀). Fills in v by arrow.
 */
function fitSite(
  context: TheoremContext,
  species: number,
  name: string,
  total: number | null,
  constants: Rational[],
): Misfit | null {
  const leaving = leavingArrows(context, species).filter(({ size }) => total === null || size <= total);
  const [first, ...others] = leaving;
  if (first === undefined) return null;
  const unit = first.size;
  const fractions = total === null ? leaving.map(({ arrow }) => rateFraction(context, arrow)) : [];
  if (fractions.some((fraction) => fraction === null))
    return { why: 'Not every law is an exact rational function of its own site.', holds: null };
  const known = fractions as Fraction[];
  const reach =
    total ?? Math.ceil(Math.max(MOST_PROBED, ...known.flatMap(boundsOf))) + 2 * leaving.at(-1)!.size;
  if (reach > MOST_UNITS * 5)
    return { why: 'Its bounds are too large to compare all n below them.', holds: null };
  const rates = leaving.map(({ arrow, size }) => ratesUpTo(context, arrow, size, reach));
  if (rates.includes(null))
    return { why: 'Not every law is an exact function of its own site.', holds: null };
  for (const [k, { size, arrow }] of leaving.entries()) {
    for (let n = size; n <= reach; n++) {
      if (sign(rates[k]![n]!) > 0) continue;
      return sign(rates[k]![n]!) < 0
        ? { why: `The rate of ${context.arrowLabel(arrow)} is negative at n = ${n}.`, holds: false }
        : { why: `Groups of ${size} stop leaving ${name} at n = ${n}.`, holds: false };
    }
  }
  const base = rates[0]!;
  for (const [k, { size, arrow }] of leaving.entries()) {
    if (size % unit !== 0) return { why: `At ${name} the sizes have no common unit.`, holds: null };
    const chain = (n: number): Rational => {
      let product: Rational = ONE;
      for (let j = 0; j < size / unit; j++) product = multiply(product, base[n - j * unit]!);
      return product;
    };
    const constant = divide(rates[k]![size]!, chain(size));
    constants[arrow] = multiply(constant, power(base[unit]!, size / unit));
    for (let n = size; n <= reach; n++) {
      const expected = multiply(constant, chain(n));
      if (compare(expected, rates[k]![n]!) !== 0) {
        return {
          why: `At ${name} the rate of ${size} units out of ${n} is ${formatRational(rates[k]![n]!)}, a factorised one would be ${formatRational(expected)}.`,
          holds: false,
        };
      }
    }
    if (total === null && !identical(known[k]!, known[0]!, unit, size / unit, constant))
      return { why: `At ${name} the rates of ${size} units agree for small n only.`, holds: false };
  }
  return others.length === 0 || total !== null || known.every(positiveFinally)
    ? null
    : { why: 'A rate is not positive for all large n.', holds: false };
}

/** Values of n that are compared one by one where nothing bounds them. */
const MOST_PROBED = 40;

/** u(m|n) for n = 0 … reach; null where a value is not exact. */
function ratesUpTo(
  context: TheoremContext,
  arrow: number,
  size: number,
  reach: number,
): readonly Rational[] | null {
  const values: Rational[] = [];
  for (let n = 0; n <= reach; n++) {
    const value = n < size ? ZERO : rateAt(context, arrow, BigInt(n));
    if (value === null) return null;
    values.push(value);
  }
  return values;
}

function boundsOf({ above, below, from }: Fraction): number[] {
  return [from, ...[above, below].filter((p) => degree(p) > 0).map(rootBound)];
}

function positiveFinally({ above, below }: Fraction): boolean {
  return above.length > 0 && sign(above.at(-1)!) === sign(below.at(-1)!);
}

/** Whether u_m(n) = c ∏_{k<q} u(n − k·unit) as rational functions. */
function identical(
  whole: Fraction,
  base: Fraction,
  unit: number,
  times: number,
  constant: Rational,
): boolean {
  let product: Fraction = { ...base, above: scale(base.above, constant) };
  for (let k = 1; k < times; k++) product = multiplyFractions(product, shifted(base, k * unit));
  const cross = (a: Polynomial, b: Polynomial): Polynomial => multiplyPolynomials(a, b);
  return subtract(cross(whole.above, product.below), cross(product.above, whole.below)).length === 0;
}

function power(base: Rational, times: number): Rational {
  let value: Rational = ONE;
  for (let k = 0; k < times; k++) value = multiply(value, base);
  return value;
}

/** Complex balance of the network with v as constants, worked out afresh by the verdict of that name. */
function balanced(context: TheoremContext, constants: readonly Rational[], total: number | null): Hypothesis {
  const claim = 'transport balances';
  const text = 'Some z > 0 balances what leaves and what enters each site, for every size m.';
  const silent = context.arrows.findIndex(
    ({ from }) => total !== null && context.terms(from)[0]!.coefficient > total,
  );
  if (silent >= 0)
    return {
      claim,
      text: `${text} ${context.arrowLabel(silent)} never occurs from this start.`,
      holds: null,
    };
  const applies = context.withMassAction(constants).verdict('complex-balance').applies;
  return { claim, text, holds: { yes: true, no: false, undecided: null }[applies] };
}
