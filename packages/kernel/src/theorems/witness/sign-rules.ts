import type { MinorPair, Witness } from '@stillroom/shared/cells';
import type { Rational } from '../../exact/index.ts';
import {
  add,
  divide,
  equals,
  isZero,
  multiply,
  negate,
  ONE,
  sign,
  toDouble,
  ZERO,
} from '../../exact/index.ts';
import type { Amounts, PlainNetwork } from './plain-network.ts';
import { changeOf, components, deficiencyOf, leadsTo, nonterminal } from './plain-network.ts';
import { exactOf, fluxVector, speciesVector } from './reading.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';
import type { Signs, UnknownsBy } from './expansion.ts';
import { fluxEntries, jacobianEntries, rankOf, signsOfMinors } from './expansion.ts';
import type { Condition } from './programme.ts';
import { feasible, unit, vanishes } from './programme.ts';
import { extremeFluxes, leavesSpeciesUnchanged, liesInClass } from './vector-rules.ts';

/**
 * A "no" needs two products of opposite sign, or a pattern of signs, or that all vanish. A "yes" is confirmed by expanding
 * the determinant on the stoichiometric subspace, or by the shape of a network of single molecules.
 */
export function oneSign(evidence: Evidence): Finding {
  const { plain, holds, witness, verdict } = evidence;
  if (holds) {
    const complaint = examplesComplaint(evidence);
    return complaint ?? (compartmental(plain) ? null : expandedSign(plain, 'arrow'));
  }
  if (witness === undefined) {
    const signs = signsOf(plain, 'arrow');
    if (signs instanceof Unconfirmed) return signs;
    return signs.positive || signs.negative ? 'some product is not zero.' : null;
  }
  if (witness.kind === 'vector') return discordant(evidence, verdict) ?? possibleForMassAction(evidence);
  if (witness.kind !== 'minors') return 'the products are missing.';
  const signs = witness.pairs.map((pair) => checkedSign(plain, pair));
  const complaint = signs.find((value) => typeof value === 'string');
  if (typeof complaint === 'string') return complaint;
  return signs.includes(1) && signs.includes(-1) ? null : 'the products have one sign.';
}

function examplesComplaint({ plain, witness }: Evidence): string | null {
  if (witness === undefined) return null;
  if (witness.kind !== 'minors') return 'a pattern cannot show this.';
  const signs = witness.pairs.map((pair) => checkedSign(plain, pair));
  const complaint = signs.find((value) => typeof value === 'string');
  if (typeof complaint === 'string') return complaint;
  return signs.length > 0 && signs.every((value) => value === signs[0]) ? null : 'the signs differ.';
}

/** All coefficients of the determinant, with one unknown for each arrow or for each arrow and reactant, have one sign. */
function expandedSign(plain: PlainNetwork, by: UnknownsBy): Finding {
  const signs = signsOf(plain, by);
  if (signs instanceof Unconfirmed) return signs;
  if (!signs.positive && !signs.negative) return 'all products are zero.';
  return signs.positive && signs.negative ? 'the products have both signs.' : null;
}

function signsOf(plain: PlainNetwork, by: UnknownsBy): Signs | Unconfirmed {
  const entries = jacobianEntries(plain, by);
  const signs = entries && signsOfMinors(entries, rankOf(plain));
  return signs ?? new Unconfirmed('the determinant is too long to expand again.');
}

/** Single molecules only, and in every component one terminal class, which holds the zero complex where there is one. */
function compartmental(plain: PlainNetwork): boolean {
  const single = plain.complexes.every(
    (complex) =>
      complex.size === 0 || (complex.size === 1 && [...complex.values()].every((a) => equals(a, ONE))),
  );
  if (!single) return false;
  const outside = nonterminal(plain);
  return components(plain).every((group) => {
    const terminal = group.filter((complex) => !outside.has(complex));
    const zero = group.find((complex) => plain.complexes[complex]!.size === 0);
    return (
      terminal.every((complex) => leadsTo(plain, terminal[0]!, complex)) &&
      (zero === undefined || !outside.has(zero))
    );
  });
}

/** The coefficients of the determinant over the cone of fluxes all have the sign of (−1)^s. */
export function criticalSign({ plain, holds }: Evidence): Finding {
  if (!holds) return 'it is never said to fail.';
  const rays = extremeFluxes(plain)?.map(
    (ray) => new Map([...ray].map(([key, value]) => [key, toDouble(value)] as const)),
  );
  const entries = rays && fluxEntries(plain, rays.map(whole));
  const size = rankOf(plain);
  const signs = entries && signsOfMinors(entries, size);
  if (!signs) return new Unconfirmed('the determinant is too long to expand again.');
  const wrong = size % 2 === 0 ? signs.negative : signs.positive;
  const right = size % 2 === 0 ? signs.positive : signs.negative;
  return right && !wrong ? null : 'a coefficient has the other sign, or all are zero.';
}

/** A ray divided by its smallest entry, where that makes it whole; rays may have any length. */
function whole(ray: ReadonlyMap<string, number>): ReadonlyMap<string, number> {
  if ([...ray.values()].every(Number.isInteger)) return ray;
  const least = Math.min(...ray.values());
  const scaled = new Map([...ray].map(([key, value]) => [key, value / least] as const));
  if (![...scaled.values()].every(Number.isInteger)) throw new Error('a ray is not whole');
  return scaled;
}

function checkedSign(plain: PlainNetwork, pair: MinorPair): 1 | -1 | string {
  const size = plain.complexes.length - components(plain).length - deficiencyOf(plain, components(plain));
  if (pair.species.length !== size || pair.reactions.length !== size)
    return `a pair needs ${size} species and reactions.`;
  const reactions = pair.reactions.map((index) => plain.reactions[index]!);
  const n = determinant(
    pair.species.map((name) => reactions.map((reaction) => changeOf(plain, reaction).get(name) ?? ZERO)),
  );
  const b = determinant(
    reactions.map(({ from }) => pair.species.map((name) => plain.complexes[from]!.get(name) ?? ZERO)),
  );
  const fractions = plain.complexes.some((complex) =>
    [...complex.values()].some(({ denominator }) => denominator !== 1n),
  );
  if (!fractions && (!equals(n, exactOf(pair.stoichiometric)) || !equals(b, exactOf(pair.reactant)))) {
    return 'a determinant has another value.';
  }
  const product = sign(n) * sign(b);
  return product === 0 ? 'a product is zero.' : product > 0 ? 1 : -1;
}

function determinant(matrix: Rational[][]): Rational {
  let value = ONE;
  for (let k = 0; k < matrix.length; k++) {
    const chosen = matrix.findIndex((row, i) => i >= k && !isZero(row[k]!));
    if (chosen < 0) return ZERO;
    if (chosen !== k) {
      [matrix[chosen], matrix[k]] = [matrix[k]!, matrix[chosen]!];
      value = negate(value);
    }
    const pivotRow = matrix[k]!;
    value = multiply(value, pivotRow[k]!);
    for (let i = k + 1; i < matrix.length; i++) {
      const factor = negate(divide(matrix[i]![k]!, pivotRow[k]!));
      matrix[i] = matrix[i]!.map((entry, j) => add(entry, multiply(factor, pivotRow[j]!)));
    }
  }
  return value;
}

/** A "no" shows a change of the species and one of the rates with compatible signs; a "yes" is expanded again. */
export function concordant(evidence: Evidence): Finding {
  const { plain, holds } = evidence;
  if (!holds) return discordant(evidence, evidence.verdict);
  return compartmental(plain) ? null : expandedSign(plain, 'arrow and reactant');
}

/** Some change z with the signs of σ gives every rate the sign it has in the pattern: then mass action can have it. */
function possibleForMassAction({ plain, verdict }: Evidence): string | null {
  const { change, given } = patternOf(plain, verdict);
  const arrows = new Map(
    plain.reactions.map((reaction, index) => [`${reaction.from} ${reaction.to}`, index]),
  );
  const flux = (key: string): number =>
    plain.reactions.reduce(
      (value, { from, to }, index) =>
        `${from} ${to}` === key ? value + sign(given.get(index) ?? ZERO) : value,
      0,
    );
  const turned = (row: readonly Rational[], way: number): Rational[] =>
    row.map((v) => (way < 0 ? negate(v) : v));
  const conditions: Condition[] = plain.species.map((name, i) => {
    const way = sign(change.get(name) ?? ZERO);
    return { coefficients: turned(unit(plain.species.length, i, 1), way), strict: way !== 0 };
  });
  for (const [key, index] of arrows) {
    const complex = plain.complexes[plain.reactions[index]!.from]!;
    const way = flux(key);
    const row = plain.species.map((name) => complex.get(name) ?? ZERO);
    if (vanishes(row)) continue;
    conditions.push({ coefficients: turned(row, way), strict: way !== 0 });
  }
  return feasible(plain.species.length, conditions) ? null : 'mass action cannot give the rates these signs.';
}

/** Checks the pair of vectors that two hypotheses of the verdict carry between them. */
function discordant({ plain }: Evidence, verdict: Evidence['verdict']): string | null {
  const { change, given } = patternOf(plain, verdict);
  if (change.size === 0) return 'the change of the species is zero.';
  if (!liesInClass(plain, change)) return 'the change of the species leaves its class.';
  if (!leavesSpeciesUnchanged(plain, given)) return 'the change of the rates changes a species.';
  return compatible(plain, change, given);
}

function patternOf(
  plain: PlainNetwork,
  verdict: Evidence['verdict'],
): { readonly change: Amounts; readonly given: ReadonlyMap<number, Rational> } {
  const vectors = verdict.hypotheses.flatMap(({ witness }): Witness[] =>
    witness?.kind === 'vector' ? [witness] : [],
  );
  const change = speciesVector(
    vectors.find((vector) => vector.kind === 'vector' && vector.of === 'laws'),
    plain,
  );
  const given = fluxVector(
    vectors.find((vector) => vector.kind === 'vector' && vector.of === 'fluxes'),
    plain,
  );
  return { change, given };
}

function compatible(
  plain: PlainNetwork,
  change: Amounts,
  flux: ReadonlyMap<number, Rational>,
): string | null {
  const seen = new Set<string>();
  for (const [index, reaction] of plain.reactions.entries()) {
    const key = `${reaction.from} ${reaction.to}`;
    if (seen.has(key)) continue;
    seen.add(key);
    const signs = [...plain.complexes[reaction.from]!.keys()].map((name) => sign(change.get(name) ?? ZERO));
    const rate = sign(flux.get(index) ?? ZERO);
    const mixed = signs.includes(1) && signs.includes(-1);
    if (rate === 0 ? !mixed && signs.some((value) => value !== 0) : !signs.includes(rate)) {
      return `the signs do not fit at reaction ${index}.`;
    }
  }
  return null;
}
