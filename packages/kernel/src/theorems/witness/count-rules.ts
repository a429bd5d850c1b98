import type { Rational } from '../../exact/index.ts';
import { add, multiply, sign, toDouble, ZERO } from '../../exact/index.ts';
import type { Amounts } from './plain-network.ts';
import { arrowRates, changeOf, paired } from './plain-network.ts';
import { massAction, namesPower } from './rate-rules.ts';
import { speciesVector } from './reading.ts';
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

/** No reactant complex of two or more molecules raises the weighted sum (arrow by arrow, or on average). */
export function linearGrowth(evidence: Evidence): string | null {
  return evidence.holds ? driftComplaint(evidence, 2) : 'it is never said to fail.';
}

/** No reactant complex raises it, and for each species the complexes made of it alone lower it. */
export function inwardDrift(evidence: Evidence): string | null {
  if (!evidence.holds) return 'it is never said to fail.';
  const complaint = driftComplaint(evidence, 1);
  if (complaint !== null) return complaint;
  const { plain } = evidence;
  const weights = speciesVector(evidence.witness, plain);
  const alone = plain.species.every((name) =>
    [...drifts(evidence, weights)].some(([complex, values]) => {
      const { size } = plain.complexes[complex]!;
      return size === 1 && plain.complexes[complex]!.has(name) && values.some((value) => sign(value) < 0);
    }),
  );
  return alone ? null : 'some species is not drawn in.';
}

function driftComplaint(evidence: Evidence, smallest: number): string | null {
  const { plain, witness } = evidence;
  const weights = speciesVector(witness, plain);
  if (plain.species.some((name) => sign(weights.get(name) ?? ZERO) <= 0)) return 'a weight is not positive.';
  for (const [complex, values] of drifts(evidence, weights)) {
    if (sizeOf(plain.complexes[complex]!) >= smallest && values.some((value) => sign(value) > 0)) {
      return 'a reactant complex raises the weighted sum.';
    }
  }
  return null;
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
