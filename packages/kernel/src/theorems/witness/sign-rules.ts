import type { MinorPair, Witness } from '@stillroom/shared/cells';
import type { Rational } from '../../exact/index.ts';
import { add, divide, equals, isZero, multiply, negate, ONE, sign, ZERO } from '../../exact/index.ts';
import type { Amounts, PlainNetwork } from './plain-network.ts';
import { changeOf, components, deficiencyOf } from './plain-network.ts';
import { exactOf, fluxVector, speciesVector } from './reading.ts';
import type { Evidence } from './rules.ts';
import { leavesSpeciesUnchanged, liesInClass } from './vector-rules.ts';

/** Determinants worked out again; a "no" needs two products of opposite sign, or a pattern of signs. */
export function oneSign(evidence: Evidence): string | null {
  const { plain, holds, witness, verdict } = evidence;
  if (witness === undefined) return null;
  if (witness.kind === 'vector') return holds ? 'a pattern cannot show this.' : discordant(evidence, verdict);
  if (witness.kind !== 'minors') return 'the products are missing.';
  const signs = witness.pairs.map((pair) => checkedSign(plain, pair));
  const complaint = signs.find((value) => typeof value === 'string');
  if (typeof complaint === 'string') return complaint;
  if (holds)
    return signs.length > 0 && signs.every((value) => value === signs[0]) ? null : 'the signs differ.';
  return signs.includes(1) && signs.includes(-1) ? null : 'the products have one sign.';
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

/** A "no" shows a change of the species and one of the rates with compatible signs; a "yes" stands on the search alone. */
export function concordant(evidence: Evidence): string | null {
  return evidence.holds ? null : discordant(evidence, evidence.verdict);
}

/** Checks the pair of vectors that two hypotheses of the verdict carry between them. */
function discordant({ plain }: Evidence, verdict: Evidence['verdict']): string | null {
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
  if (change.size === 0) return 'the change of the species is zero.';
  if (!liesInClass(plain, change)) return 'the change of the species leaves its class.';
  if (!leavesSpeciesUnchanged(plain, given)) return 'the change of the rates changes a species.';
  return compatible(plain, change, given);
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
