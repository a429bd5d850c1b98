import type { Hypothesis } from '@stillroom/shared/cells';
import { exactValue } from '@stillroom/shared/expression';
import type { Rational } from '../../exact/index.ts';
import {
  add,
  compare,
  divide,
  equals,
  formatRational,
  isZero,
  multiply,
  ONE,
  rational,
  sign,
  ZERO,
} from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';

/** Units up to which rates are compared where nothing bounds them. */
const CHECKED = 60;

/** The hypotheses that rates factorise and that z exists, and the weight in words where it is known. */
export interface FactorisedRates {
  readonly hypotheses: readonly Hypothesis[];
  readonly weight: string | null;
}

/**
 * Checks u(m|n) = v(m) w(n − m)/w(n) site by site and then the balance of v and z. With mass action or weights the rates
 * factorise by their form, v the constants, w(n) = 1/∏ θ(j), and the balance is complex balance. With laws, w follows from
 * the rates of single units, exactly, for every n that can occur.
 */
export function factorisedRates(context: TheoremContext): FactorisedRates {
  if (context.kinetics.otherLaw === null && context.kinetics.unlikeInCounts === null) return byForm(context);
  const bound = unitBound(context);
  const sites = siteRates(context, bound ?? CHECKED);
  if (sites === null) return stated('Not every law is an exact function of its own site.', null);
  const constants = context.arrows.map(() => ONE);
  for (const site of sites) {
    const misfit = fit(site, constants);
    if (misfit !== null) return stated(misfit, false);
  }
  const factorise: Hypothesis = {
    claim: 'rates factorise',
    text: bound === null ? `${FACTORISE} This was compared up to ${CHECKED} units only.` : FACTORISE,
    holds: bound === null ? null : true,
  };
  return { hypotheses: [factorise, balanced(context, constants)], weight: null };
}

const FACTORISE = 'The rates factorise: u(m|n) = v(m) w(n − m)/w(n) at every site.';

function stated(reason: string, holds: boolean | null): FactorisedRates {
  return { hypotheses: [{ claim: 'rates factorise', text: `${FACTORISE} ${reason}`, holds }], weight: null };
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
  };
}

/** Largest number of units on one site: the total of a start in which all is conserved; null where it is not known. */
function unitBound(context: TheoremContext): number | null {
  const start = context.exactStart;
  if (start === null) return null;
  const total = start.reduce(add, ZERO);
  return total.denominator === 1n && total.numerator <= BigInt(CHECKED) ? Number(total.numerator) : null;
}

/** The rates out of one site: for each arrow its size m and u(m|n) for n = m … bound. */
interface SiteRates {
  readonly name: string;
  readonly bound: number;
  readonly leaving: readonly {
    readonly arrow: number;
    readonly size: number;
    readonly rate: readonly Rational[];
  }[];
}

function siteRates(context: TheoremContext, bound: number): SiteRates[] | null {
  const volume = context.network.compartments[0]?.volume.exact ?? ONE;
  if (!equals(volume, ONE) || context.network.fixed.size > 0) return null;
  const sites: SiteRates[] = [];
  for (const [species, name] of context.species.entries()) {
    const leaving: { arrow: number; size: number; rate: Rational[] }[] = [];
    for (const [arrow, { from }] of context.arrows.entries()) {
      const term = context.terms(from)[0]!;
      if (term.species !== species || term.coefficient > bound) continue;
      const rate: Rational[] = [];
      for (let n = 0; n <= bound; n++) {
        const value = n < term.coefficient ? ZERO : rateOf(context, arrow, name, rational(BigInt(n)));
        if (value === null) return null;
        rate.push(value);
      }
      leaving.push({ arrow, size: term.coefficient, rate });
    }
    sites.push({ name, bound, leaving });
  }
  return sites;
}

/** The propensity of an arrow (its equal rows added) with n units on its site. */
function rateOf(context: TheoremContext, arrow: number, site: string, n: Rational): Rational | null {
  const { network, structure } = context;
  let total: Rational = ZERO;
  for (let reaction = 0; reaction < structure.reactions.count; reaction++) {
    if (structure.reactions.arrow[reaction] !== arrow) continue;
    const written = structure.reactions.source[reaction]!;
    const law = network.laws[network.reactions.law[written]!];
    const constant = (name: string): Rational | null =>
      name === site ? n : (network.constants.find((entry) => entry.name === name)?.quantity?.exact ?? null);
    const value =
      law === undefined
        ? massActionRate(
            context,
            arrow,
            network.constants[network.reactions.constant[written]!]?.quantity?.exact ?? null,
            n,
          )
        : exactValue(law.expression, constant);
    if (value === null || sign(value) < 0) return null;
    total = add(total, value);
  }
  return total;
}

/** k n(n − 1) … (n − m + 1). */
function massActionRate(
  context: TheoremContext,
  arrow: number,
  constant: Rational | null,
  n: Rational,
): Rational | null {
  if (constant === null) return null;
  const size = context.terms(context.arrows[arrow]!.from)[0]!.coefficient;
  let value = constant;
  for (let k = 0; k < size; k++) value = multiply(value, add(n, rational(BigInt(-k))));
  return value;
}

/** Finds w from single units and compares the others; fills in v by arrow. A sentence where the rates do not fit. */
function fit({ name, bound, leaving }: SiteRates, constants: Rational[]): string | null {
  const single = leaving.find(({ size }) => size === 1);
  if (single === undefined)
    return leaving.length === 0 ? null : `No single unit leaves ${name}, so w is not determined.`;
  const w: Rational[] = [ONE];
  for (let n = 1; n <= bound; n++) {
    const rate = single.rate[n]!;
    if (isZero(rate)) return `Single units stop leaving ${name} at n = ${n}.`;
    w.push(divide(multiply(single.rate[1]!, w[n - 1]!), rate));
  }
  for (const { arrow, size, rate } of leaving) {
    // v(m) from n = m, where w(0) = 1.
    const v = multiply(rate[size]!, w[size]!);
    constants[arrow] = v;
    for (let n = size; n <= bound; n++) {
      const expected = divide(multiply(v, w[n - size]!), w[n]!);
      if (compare(expected, rate[n]!) !== 0) {
        return `At ${name} the rate of ${size} units out of ${n} is ${formatRational(rate[n]!)}, a factorised one would be ${formatRational(expected)}.`;
      }
    }
  }
  return null;
}

/** Complex balance of the network with v as constants, worked out afresh by the verdict of that name. */
function balanced(context: TheoremContext, constants: readonly Rational[]): Hypothesis {
  const claim = 'transport balances';
  const text = 'Some z > 0 balances what leaves and what enters each site, for every size m.';
  if (constants.some((value) => sign(value) <= 0))
    return { claim, text: `${text} Some reaction never occurs.`, holds: null };
  const applies = context.withMassAction(constants).verdict('complex-balance').applies;
  return { claim, text, holds: { yes: true, no: false, undecided: null }[applies] };
}
