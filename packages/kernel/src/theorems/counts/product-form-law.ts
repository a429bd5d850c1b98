import { exactValue } from '@stillroom/shared/expression';
import { exactBalancedState } from '../../balance/exact-state.ts';
import type { Rational } from '../../exact/index.ts';
import { add, divide, equals, isZero, multiply, ONE, rational, ZERO } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import { moleculesPerUnit } from './count-scale.ts';

/** Single-site weights f(0) … f(upTo). */
export type SiteWeights = readonly Rational[];

/**
 * f(n) = C^n / ∏_{j≤n} θ(j) for a species, exactly, with C = V c molecules at the complex-balanced state of `exactBalancedState` and
 * θ(j) = j where no weight is given. Null where C or a weight has no exact value, or a weight is not positive.
 */
export function siteWeights(context: TheoremContext, species: number, upTo: number): SiteWeights | null {
  const state = exactBalancedState(context);
  const volume = moleculesPerUnit(context.network, context.structure.sourceSpecies[species]!);
  if (state === null || volume === null) return null;
  const parameter = multiply(volume, state[species]!);
  const weight = context.network.weights.get(context.structure.sourceSpecies[species]!);
  const constant = (name: string): Rational | null =>
    context.network.constants.find((entry) => entry.name === name)?.quantity?.exact ?? null;
  const weights: Rational[] = [ONE];
  for (let n = 1; n <= upTo; n++) {
    const count = rational(BigInt(n));
    const theta = weight === undefined ? count : weightAt(weight, count, constant);
    if (theta === null || theta.numerator <= 0n) return null;
    weights.push(multiply(weights[n - 1]!, divide(parameter, theta)));
  }
  return weights;
}

/** A weight at n, with `min` and `max` resolved by exact comparison. */
function weightAt(
  weight: Parameters<typeof exactValue>[0],
  n: Rational,
  constant: (name: string) => Rational | null,
): Rational | null {
  const lookup = (name: string): Rational | null => (name === 'n' ? n : constant(name));
  if (weight.kind !== 'call') return exactValue(weight, lookup);
  if (weight.name !== 'min' && weight.name !== 'max') return null;
  const values = weight.arguments.map((part) => weightAt(part, n, constant));
  let chosen: Rational | null = null;
  for (const value of values) {
    if (value === null) return null;
    const below =
      chosen !== null && value.numerator * chosen.denominator < chosen.numerator * value.denominator;
    if (chosen === null || equals(value, chosen) || below === (weight.name === 'min')) chosen = value;
  }
  return chosen;
}

/**
 * The marginal law of each species on the closed set { x ≥ 0 : Σ x_i = total } of a network whose only conservation law is
 * the number of molecules: P(x_i = n) = f_i(n) G_(i)(total − n) / G(total), G the convolution of all f, G_(i) of all but the
 * i-th, from prefix and suffix products so that nothing is subtracted (Evans, Hanney 2005). Null where another law holds
 * or f is not known. Only meaningful where the verdict "product-form" applies.
 */
export function closedMarginals(context: TheoremContext, total: number): Rational[][] | null {
  const [law, ...others] = context.lawBasis;
  if (law === undefined || others.length > 0 || law.some((weight) => weight !== law[0])) return null;
  const weights = context.species.map((_, i) => siteWeights(context, i, total));
  const sites: SiteWeights[] = [];
  for (const site of weights) {
    if (site === null) return null;
    sites.push(site);
  }
  const nothing: SiteWeights = [ONE, ...Array.from({ length: total }, () => ZERO)];
  const before: SiteWeights[] = [nothing];
  for (const site of sites) before.push(convolved(before.at(-1)!, site));
  const after: SiteWeights[] = [nothing];
  for (const site of [...sites].reverse()) after.unshift(convolved(after[0]!, site));
  const normaliser = before.at(-1)![total]!;
  return sites.map((site, i) => {
    const others = convolved(before[i]!, after[i + 1]!);
    return site.map((weight, n) => divide(multiply(weight, others[total - n]!), normaliser));
  });
}

function convolved(a: SiteWeights, b: SiteWeights): SiteWeights {
  return a.map((_, n) => {
    let sum = ZERO;
    for (let k = 0; k <= n; k++) {
      if (!isZero(a[k]!) && !isZero(b[n - k]!)) sum = add(sum, multiply(a[k]!, b[n - k]!));
    }
    return sum;
  });
}
