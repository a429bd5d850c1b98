import type { Rational } from '../../exact/index.ts';
import { add, compare, divide, isZero, multiply, ONE, sign, toDouble, ZERO } from '../../exact/index.ts';
import type { Amounts, PlainNetwork } from './plain-network.ts';
import { arrowRates, changeOf, paired } from './plain-network.ts';
import { massAction, namesPower } from './rate-rules.ts';
import { speciesVector } from './reading.ts';
import { nonnegativeLaws } from './vector-rules.ts';
import type { Evidence } from './evidence.ts';

/** Mass action (weights aside) with whole numbers of molecules. */
export function countRates(evidence: Evidence): string | null {
  const whole = evidence.plain.complexes.every((complex) =>
    [...complex.values()].every(({ denominator }) => denominator === 1n),
  );
  if (whole) return namesPower(evidence) ? null : massAction(evidence);
  return evidence.holds ? 'a coefficient is not a whole number.' : null;
}

function sizeOf(complex: Amounts): number {
  return [...complex.values()].reduce((sum, amount) => sum + toDouble(amount), 0);
}

/** All complexes have at most one molecule, or the one named has more. */
export function noLargeComplex({ plain, holds, witness }: Evidence): string | null {
  if (holds)
    return plain.complexes.every((complex) => sizeOf(complex) <= 1) ? null : 'some complex is larger.';
  const named =
    witness?.kind === 'set' && 'complexes' in witness ? plain.complexes[witness.complexes[0]!] : undefined;
  return named !== undefined && sizeOf(named) > 1 ? null : 'the complex named is not larger.';
}

/** Reactions between multiples of single species of equal size; or the reaction named is none. */
export function sitesOnly({ network, plain, holds, witness }: Evidence): string | null {
  const moves = plain.reactions.map(({ from, to }) => {
    const source = plain.complexes[from]!;
    const target = plain.complexes[to]!;
    return (
      source.size === 1 &&
      target.size === 1 &&
      sizeOf(source) === sizeOf(target) &&
      Number.isInteger(sizeOf(source))
    );
  });
  const untouched = network.events.length === 0 && network.rateRules.size === 0;
  if (!untouched) return holds ? 'something else changes a species.' : null;
  if (holds) return moves.every(Boolean) ? null : 'some reaction does something else.';
  return witness?.kind === 'arrow' && moves[witness.reaction] === false
    ? null
    : 'the reaction named moves mass.';
}

/** No reactant complex of two or more weighted molecules raises the weighted sum (arrow by arrow, or on average). */
export function linearGrowth(evidence: Evidence): string | null {
  if (!evidence.holds) return 'it is never said to fail.';
  const { plain } = evidence;
  const weights = speciesVector(evidence.witness, plain);
  const complaint = weightsComplaint(plain, [weights], new Set(weights.keys()));
  if (complaint !== null) return complaint;
  const raised = [...drifts(evidence, weights)].some(([complex, values]) => {
    const amounts = [...plain.complexes[complex]!].filter(([name]) => weights.has(name));
    return sizeOf(new Map(amounts)) >= 2 && values.some((value) => sign(value) > 0);
  });
  return raised ? 'a reactant complex raises the weighted sum.' : null;
}

/**
 * For each weighted species the complexes made of it alone lower the sum, n of it the highest, and a complex y that raises
 * it has Σ y_i/n_i < 1 over the weighted species. Several hypotheses of this claim are w⁰, w¹, … of w⁰ + ε w¹ + …: what
 * counts for a complex is the first of them that one of its arrows changes.
 */
export function inwardDrift(evidence: Evidence): string | null {
  const { plain, verdict, holds } = evidence;
  if (!holds) return 'it is never said to fail.';
  const levels = verdict.hypotheses
    .filter(({ claim }) => claim === 'inward drift')
    .map(({ witness }) => speciesVector(witness, plain));
  const weighted = new Set(levels.flatMap((level) => [...level.keys()]));
  const complaint = weightsComplaint(plain, levels, weighted);
  if (complaint !== null) return complaint;
  const highest = new Map<string, Rational>();
  const raised: Amounts[] = [];
  const drifted = levels.map((level) => drifts(evidence, level));
  for (const complex of drifted[0]!.keys()) {
    const all = plain.complexes[complex]!;
    const amounts = new Map([...all].filter(([name]) => weighted.has(name)));
    const first = drifted.map((level) => level.get(complex)!).find((values) => !values.every(isZero)) ?? [];
    if (first.some((value) => sign(value) > 0)) raised.push(amounts);
    else if (first.length > 0 && all.size === 1 && amounts.size === 1)
      for (const [name, amount] of amounts)
        if (compare(amount, highest.get(name) ?? ZERO) > 0) highest.set(name, amount);
  }
  if ([...weighted].some((name) => !highest.has(name))) return 'some species is not drawn in.';
  const outgrown = raised.every((amounts) => {
    const share = [...amounts].reduce(
      (sum, [name, amount]) => add(sum, divide(amount, highest.get(name)!)),
      ZERO,
    );
    return compare(share, ONE) < 0;
  });
  return outgrown ? null : 'a reactant complex raises the weighted sum.';
}

/** Weights are not negative, and a species without any is bounded by a law. */
function weightsComplaint(
  plain: PlainNetwork,
  levels: readonly Amounts[],
  weighted: ReadonlySet<string>,
): string | null {
  if (weighted.size === 0 && plain.species.length > 0) return 'no species has a weight.';
  if (levels.some((level) => [...level.values()].some((value) => sign(value) <= 0)))
    return 'a weight is not positive.';
  const missing = plain.species.filter((name) => !weighted.has(name));
  if (missing.length === 0) return null;
  const laws = nonnegativeLaws(plain, plain.species) ?? [];
  return missing.every((name) => laws.some((law) => law.has(name)))
    ? null
    : 'a species without weight is not bounded by a law.';
}

/** By reactant complex: w·ν of each arrow, or their mean for the constants of the text. */
function drifts({ plain, verdict }: Evidence, weights: Amounts): Map<number, Rational[]> {
  const rates = verdict.scope === 'these constants' ? arrowRates(plain) : null;
  const seen = new Set<string>();
  const byComplex = new Map<number, Rational[]>();
  for (const reaction of plain.reactions) {
    const key = `${reaction.from} ${reaction.to}`;
    if (seen.has(key)) continue;
    seen.add(key);
    const drift = paired(weights, changeOf(plain, reaction));
    const known = byComplex.get(reaction.from) ?? [];
    if (rates === null) byComplex.set(reaction.from, [...known, drift]);
    else byComplex.set(reaction.from, [add(known[0] ?? ZERO, multiply(rates.get(key)!, drift))]);
  }
  return byComplex;
}
