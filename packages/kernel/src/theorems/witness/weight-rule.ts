import { elementary, evaluate } from '@stillroom/shared/expression';
import { negate, rational, subtract, toDouble, ZERO } from '../../exact/index.ts';
import { moleculesPerUnit } from '../counts/count-scale.ts';
import { nullspace, treeConstants } from './balance-rules.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';
import { growthDegree } from './law-rule.ts';
import type { PlainNetwork } from './plain-network.ts';
import { arrowRates, components } from './plain-network.ts';
import { exactOf } from './reading.ts';
import { nonnegativeLaws } from './vector-rules.ts';

/** Values of n at which a weight that is said not to be positive is looked at. */
const LOOKED_AT = 1_000;
/** Large counts at which a limit is read. */
const FAR = 10 ** 7;

/** The terms C^n/∏ θ(j) of the species that the text names first have a finite sum, or a weight is not positive. */
export function weightSummable(evidence: Evidence): Finding {
  const { network, plain, hypothesis, holds, witness } = evidence;
  const weighted = [...network.weights].map(([index, weight]) => ({ name: network.species[index]!, weight }));
  const own = weighted.filter(({ name }) => new RegExp(`of ${name}\\b`).test(hypothesis.text)).at(0);
  if (own === undefined) return 'no weighted species is named.';
  const theta = (n: number): number =>
    evaluate(own.weight, (name) =>
      name === 'n' ? n : (network.constants.find((c) => c.name === name)?.quantity?.value ?? NaN),
    );
  if (!holds && Array.from({ length: LOOKED_AT }, (_, k) => theta(k + 1)).some((value) => !(value > 0)))
    return null;
  if (holds && witness === undefined) {
    const bounded = nonnegativeLaws(plain, plain.species)?.some((law) => law.has(own.name)) ?? false;
    if (bounded) return null;
    const degree = growthDegree(own.weight, 'n');
    if (degree === null) return new Unconfirmed('the growth of the weight is not read again.');
    return degree > 0 ? null : 'the weight does not grow without bound.';
  }
  if (witness?.kind !== 'number') return 'the two numbers are missing.';
  const c = toDouble(exactOf(witness.left));
  const limit = toDouble(exactOf(witness.right));
  const measured = parameterOf(evidence, own.name);
  if (measured === null || Math.abs(measured - c) > 1e-9 * c) return 'C has another value.';
  if (Math.abs(theta(FAR) - limit) > 1e-4 * Math.max(limit, 1e-3))
    return 'the weight tends to another limit.';
  if (Math.abs(c - limit) > 1e-9 * limit) return holds === c < limit ? null : 'the numbers say the opposite.';
  const slope = FAR * (theta(FAR) / limit - 1);
  if (Math.abs(slope - 1) < 1e-2)
    return holds ? new Unconfirmed('the sum is too close to its threshold.') : null;
  return holds === slope > 1 ? null : 'the second term says the opposite.';
}

/** C = V c of a species that complex balance determines: ln c_i is a combination of ln(K_y'/K_y) within the components. */
function parameterOf({ network, plain }: Evidence, name: string): number | null {
  const rates = arrowRates(plain);
  const scale = moleculesPerUnit(network, network.species.indexOf(name));
  if (rates === null || scale === null) return null;
  const trees = treeConstants(plain, rates);
  const edges = components(plain).flatMap(([first, ...others]) =>
    others.map((other) => [first!, other] as const),
  );
  const relation = relationOf(plain, name, edges);
  if (relation === null) return null;
  const logarithm = edges.reduce(
    (sum, [a, b], k) =>
      sum + relation[k]! * (elementary.ln(toDouble(trees[b]!)) - elementary.ln(toDouble(trees[a]!))),
    0,
  );
  return toDouble(scale) * elementary.exp(logarithm);
}

/** Coefficients q with Σ q_e (y' − y) the unit vector of the species; null where there are none. */
function relationOf(
  plain: PlainNetwork,
  name: string,
  edges: readonly (readonly [number, number])[],
): number[] | null {
  const rows = plain.species.map((species) => [
    ...edges.map(([a, b]) =>
      subtract(plain.complexes[b]!.get(species) ?? ZERO, plain.complexes[a]!.get(species) ?? ZERO),
    ),
    species === name ? negate(rational(1n)) : ZERO,
  ]);
  const vector = nullspace(rows, edges.length + 1).find((candidate) => candidate.at(-1) !== 0n);
  if (vector === undefined) return null;
  const last = vector.at(-1)!;
  return vector.slice(0, -1).map((value) => toDouble(rational(value, last)));
}
