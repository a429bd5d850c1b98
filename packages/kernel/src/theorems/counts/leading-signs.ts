import type { Hypothesis, VerdictScope } from '@stillroom/shared/cells';
import type { Rational } from '../../exact/index.ts';
import {
  compare,
  divide,
  formatRational,
  gcd,
  multiply,
  ONE,
  power,
  rational,
  rationalForResult,
  sign,
  subtract,
  ZERO,
} from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import { massActionInCounts } from '../hypotheses.ts';
import type { Polynomial } from '../polynomials/polynomial.ts';
import {
  add as addPolynomials,
  degree,
  multiply as multiplyPolynomials,
  polynomial,
  scale,
} from '../polynomials/polynomial.ts';
import { moleculesPerUnit } from './count-scale.ts';

/** How counts on a line behave far out, and what that rests on. */
export interface LineBehaviour {
  readonly explodes: boolean;
  readonly recurrence: 'positive' | 'null' | 'transient';
  readonly scope: VerdictScope;
  /** R, and α or (where α = 0) β, as a sentence. */
  readonly text: string;
  /** The number whose sign decided, where constants were needed. */
  readonly decisive: Rational | null;
}

/**
 * The dynamics of counts that move along one line x = a + t r, r ≥ 0, classified by the leading terms of the rates for
 * large t (Xu, Hansen, Wiuf 2022): R the highest degree, α t^R and γ t^(R−1) the leading terms of the mean change, ϑ t^R of
 * half the mean square change, β = γ − ϑ. Explosive exactly when R > 1 and α > 0, or R > 2, α = 0 and β > 0. Recurrent
 * exactly when α < 0, or α = 0 and β ≤ 0; positive recurrent exactly when α < 0, or α = 0, β < 0 and R > 1, or
 * α = β = 0 and R > 2. Null where counts do not move along one line without end, or values that are needed are missing.
 */
export function lineBehaviour(context: TheoremContext): LineBehaviour | null {
  return context.memo('line behaviour', () => {
    if (context.rank !== 1 || !context.dense || massActionInCounts(context).holds !== true) return null;
    const line = lineOf(context);
    return line && (forAllConstants(line) ?? forTheseConstants(context, line));
  });
}

interface Jump {
  readonly arrow: number;
  /** The change along r. */
  readonly steps: number;
  /** Molecules of the species that move, and of those that stand still. */
  readonly degree: number;
}

interface Line {
  readonly context: TheoremContext;
  /** The primitive direction, nowhere negative. */
  readonly direction: readonly number[];
  readonly jumps: readonly Jump[];
  /** Whether some reactant does not move, so that its count belongs to the start. */
  readonly standing: boolean;
}

/** Coefficients above which rates are not expanded. */
const HIGHEST_DEGREE = 24;

function lineOf(context: TheoremContext): Line | null {
  const first = context.coefficients.change(context.arrows[0]!.from, context.arrows[0]!.to);
  const size = [...first.values()].reduce(gcd, 0n);
  const sense = [...first.values()].some((value) => value > 0n) ? size : -size;
  const direction = context.species.map((_, i) => Number((first.get(i) ?? 0n) / sense));
  if (direction.some((value) => value < 0)) return null;
  const lead = direction.findIndex((value) => value > 0);
  const jumps = context.arrows.map(({ from, to }, arrow): Jump => ({
    arrow,
    steps: Number(context.coefficients.change(from, to).get(lead) ?? 0n) / direction[lead]!,
    degree: context
      .terms(from)
      .reduce((sum, { species, coefficient }) => sum + (direction[species]! > 0 ? coefficient : 0), 0),
  }));
  if (jumps.some((jump) => jump.degree > HIGHEST_DEGREE)) return null;
  const standing = context.arrows.some(({ from }) =>
    context.terms(from).some(({ species }) => direction[species] === 0),
  );
  return { context, direction, jumps, standing };
}

/** Where all arrows of the highest degree move the same way, α has that sign whatever the constants. */
function forAllConstants({ context, jumps, standing }: Line): LineBehaviour | null {
  if (standing) return null;
  const highest = Math.max(...jumps.map((jump) => jump.degree));
  const leading = jumps.filter((jump) => jump.degree === highest);
  const [first] = leading;
  if (leading.some(({ steps }) => Math.sign(steps) !== Math.sign(first!.steps))) return null;
  const up = first!.steps > 0;
  const named = leading.map(({ arrow }) => context.arrowLabel(arrow)).join(', ');
  const text = `all reactions of the highest degree R = ${highest} (${named}) ${up ? 'raise' : 'lower'} the counts`;
  return classified(highest, rational(up ? 1n : -1n), null, 'all constants', text);
}

function forTheseConstants(context: TheoremContext, line: Line): LineBehaviour | null {
  const constants = countConstants(context);
  if (constants === null) return null;
  const moving = line.direction.filter((value) => value > 0).length;
  const start = startCounts(context);
  if (line.standing && start === null) return null;
  // One species alone: every class is a part of the whole numbers, and a = 0 will do.
  const offset = start ?? (moving === 1 ? context.species.map(() => ZERO) : null);
  const leading = offset ?? context.species.map(() => ZERO);
  const rates = line.jumps.map(({ arrow }) =>
    rateOf(context, line.direction, leading, arrow, constants[arrow]!),
  );
  const highest = Math.max(...rates.map(degree));
  if (highest < 0) return null;
  const drift = weightedSum(line, rates, (steps) => steps);
  const alpha = drift[highest] ?? ZERO;
  const scope = line.standing ? 'these constants and start' : 'these constants';
  const order = `R = ${highest} is the highest degree of a rate`;
  if (sign(alpha) !== 0)
    return classified(
      highest,
      alpha,
      null,
      scope,
      `${order}, and α = ${formatRational(alpha)} the leading coefficient of the mean change`,
    );
  if (offset === null) return null;
  const gamma = drift[highest - 1] ?? ZERO;
  const theta = divide(weightedSum(line, rates, (steps) => steps * steps)[highest] ?? ZERO, rational(2n));
  const beta = subtract(gamma, theta);
  const text = `${order}, the mean change has no term of this degree (α = 0), and β = ${formatRational(beta)} compares its next coefficient with the spread`;
  return classified(highest, alpha, beta, moving > 1 ? 'these constants and start' : scope, text);
}

function classified(
  highest: number,
  alpha: Rational,
  beta: Rational | null,
  scope: VerdictScope,
  text: string,
): LineBehaviour {
  const a = sign(alpha);
  const b = beta === null ? 0 : sign(beta);
  const decisive = scope === 'all constants' ? null : (beta ?? alpha);
  if (a !== 0) {
    return {
      explodes: a > 0 && highest > 1,
      recurrence: a < 0 ? 'positive' : 'transient',
      scope,
      text,
      decisive,
    };
  }
  const positive = b < 0 ? highest > 1 : b === 0 && highest > 2;
  return {
    explodes: b > 0 && highest > 2,
    recurrence: b > 0 ? 'transient' : positive ? 'positive' : 'null',
    scope,
    text,
    decisive,
  };
}

/** c_j = k_j V^(−|y|): the constants in counts, up to one common factor; null where values are missing. */
function countConstants(context: TheoremContext): Rational[] | null {
  const constants = context.exactConstants;
  const scale = commonScale(context);
  if (constants === null || scale === null) return null;
  return constants.map((constant, arrow) => {
    const molecules = context
      .terms(context.arrows[arrow]!.from)
      .reduce((sum, { coefficient }) => sum + coefficient, 0);
    return divide(constant, power(scale, molecules));
  });
}

/** Molecules per unit of concentration, the same for all species; else null. */
function commonScale(context: TheoremContext): Rational | null {
  const scales = Array.from(context.structure.sourceSpecies, (written) =>
    moleculesPerUnit(context.network, written),
  );
  const [first] = scales;
  if (first === undefined) return ONE;
  return first !== null && scales.every((value) => value !== null && compare(value, first) === 0)
    ? first
    : null;
}

/** Counts at the start, where they are whole numbers. */
function startCounts(context: TheoremContext): Rational[] | null {
  const scale = commonScale(context);
  const counts = scale && context.exactStart?.map((amount) => multiply(amount, scale));
  return counts?.every(({ denominator }) => denominator === 1n) === true ? counts : null;
}

/** The propensity of an arrow at a + t r, as a polynomial in t. */
function rateOf(
  context: TheoremContext,
  direction: readonly number[],
  offset: readonly Rational[],
  arrow: number,
  constant: Rational,
): Polynomial {
  let rate = polynomial(constant);
  for (const { species, coefficient } of context.terms(context.arrows[arrow]!.from)) {
    for (let k = 0; k < coefficient; k++) {
      const factor = polynomial(
        subtract(offset[species]!, rational(BigInt(k))),
        rational(BigInt(direction[species]!)),
      );
      // A count that stands still below the coefficient switches the reaction off.
      if (direction[species] === 0 && compare(offset[species]!, rational(BigInt(k))) <= 0) return [];
      rate = multiplyPolynomials(rate, factor);
    }
  }
  return rate;
}

function weightedSum(
  { jumps }: Line,
  rates: readonly Polynomial[],
  weight: (steps: number) => number,
): Polynomial {
  return rates.reduce<Polynomial>(
    (sum, rate, k) => addPolynomials(sum, scale(rate, rational(BigInt(weight(jumps[k]!.steps))))),
    [],
  );
}

/** The hypothesis that stands for a classification: `holds` says whether the behaviour asked for is there. */
export function lineHypothesis(
  { text, decisive }: LineBehaviour,
  asked: 'no explosion' | 'positive recurrence',
  holds: boolean,
): Hypothesis {
  const said = {
    'no explosion': 'By the leading terms of the rates the counts do not explode',
    'positive recurrence': 'By the leading terms of the rates the counts are positive recurrent',
  }[asked];
  return {
    claim: asked === 'no explosion' ? 'leading terms do not explode' : 'leading terms recur',
    text: `${said}: they move along one line, and ${text} (Xu, Hansen, Wiuf 2022).`,
    holds,
    ...(decisive === null
      ? {}
      : { witness: { kind: 'number', left: rationalForResult(decisive), right: 0 } as const }),
  };
}
