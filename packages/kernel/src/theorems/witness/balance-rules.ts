import type { Rational } from '../../exact/index.ts';
import {
  clearDenominators,
  compare,
  divide,
  matrixOfRows,
  multiply,
  ONE,
  power,
  rightNullspace,
  subtract,
  ZERO,
} from '../../exact/index.ts';
import type { PlainNetwork } from './plain-network.ts';
import { arrowRates, changeOf, components, leadsTo } from './plain-network.ts';
import { exactOf } from './reading.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';

/** The two numbers agree as the hypothesis says, and all conditions together amount to complex balance. */
export function complexCondition(evidence: Evidence): Finding {
  return sidesAgree(evidence) ?? together(evidence, isComplexBalanced(evidence.plain));
}

/** The same for detailed balance. */
export function detailedCondition(evidence: Evidence): Finding {
  return sidesAgree(evidence) ?? together(evidence, isDetailedBalanced(evidence.plain));
}

/** Complex balance worked out afresh; for all constants it needs deficiency zero, which is then implied. */
export function complexBalanced({ plain, holds }: Evidence): Finding {
  const answer = isComplexBalanced(plain);
  if (answer === null) return TOO_HIGH;
  return answer === holds ? null : 'the constants say the opposite.';
}

const TOO_HIGH = new Unconfirmed('powers are too high, or constants unknown, to multiply out.');

function sidesAgree({ witness, holds }: Evidence): string | null {
  if (witness === undefined) return null;
  if (witness.kind !== 'number') return 'the two sides are missing.';
  const equal = compare(exactOf(witness.left), exactOf(witness.right)) === 0;
  return equal === holds ? null : 'the two sides say the opposite.';
}

function together({ verdict, hypothesis }: Evidence, balanced: boolean | null): Finding {
  const own = verdict.hypotheses.filter(({ claim }) => claim === hypothesis.claim);
  if (balanced === null) return TOO_HIGH;
  return balanced === own.every(({ holds }) => holds === true)
    ? null
    : 'all conditions together say the opposite.';
}

/** Whether the constants are complex balanced; null where they are not all known or powers are too high to multiply out. */
export function isComplexBalanced(plain: PlainNetwork): boolean | null {
  if (plain.reactions.some(({ from, to }) => !leadsTo(plain, to, from))) return false;
  const groups = components(plain);
  const rows = plain.species.map((name) => plain.complexes.map((complex) => complex.get(name) ?? ZERO));
  for (const group of groups) rows.push(plain.complexes.map((_, y) => (group.includes(y) ? ONE : ZERO)));
  const relations = nullspace(rows, plain.complexes.length);
  if (relations.length === 0) return true;
  const rates = arrowRates(plain);
  if (rates === null) return null;
  return allProductsOne(relations, treeConstants(plain, rates));
}

/** A positive kernel vector of the Laplacian of every component, by complex. */
export function treeConstants(plain: PlainNetwork, rates: ReadonlyMap<string, Rational>): Rational[] {
  const trees = plain.complexes.map(() => ONE);
  for (const group of components(plain)) {
    const matrix = group.map((row) =>
      group.map((column) =>
        row === column
          ? group.reduce((sum, other) => subtract(sum, rates.get(`${column} ${other}`) ?? ZERO), ZERO)
          : (rates.get(`${column} ${row}`) ?? ZERO),
      ),
    );
    nullspace(matrix, group.length)[0]?.forEach(
      (value, i) => (trees[group[i]!] = { numerator: value, denominator: 1n }),
    );
  }
  return trees;
}

/** Whether the constants are detailed balanced; null as above. */
export function isDetailedBalanced(plain: PlainNetwork): boolean | null {
  const rates = arrowRates(plain);
  const keys = [...new Set(plain.reactions.map(({ from, to }) => `${from} ${to}`))];
  const reversed = (key: string): string => key.split(' ').reverse().join(' ');
  if (keys.some((key) => !keys.includes(reversed(key)))) return false;
  const pairs = keys.filter((key, i) => keys.indexOf(reversed(key)) > i);
  const changes = pairs.map((key) => {
    const [from, to] = key.split(' ').map(Number);
    return changeOf(plain, { from: from!, to: to! });
  });
  const relations = nullspace(
    plain.species.map((name) => changes.map((change) => change.get(name) ?? ZERO)),
    pairs.length,
  );
  if (relations.length === 0) return true;
  return (
    rates &&
    allProductsOne(
      relations,
      pairs.map((key) => divide(rates.get(key)!, rates.get(reversed(key))!)),
    )
  );
}

/** An integer basis of the vectors that rational rows send to zero. */
export function nullspace(rows: readonly (readonly Rational[])[], columns: number): bigint[][] {
  return rightNullspace(
    matrixOfRows(
      rows.map((row) => clearDenominators(row).integers),
      columns,
    ),
  );
}

/** Exponents up to which powers are multiplied out. */
const HIGHEST_POWER = 400n;

function allProductsOne(
  relations: readonly (readonly bigint[])[],
  bases: readonly Rational[],
): boolean | null {
  if (
    relations.some((relation) =>
      relation.some((exponent) => exponent > HIGHEST_POWER || exponent < -HIGHEST_POWER),
    )
  )
    return null;
  return relations.every((relation) => {
    const product = relation.reduce(
      (value, exponent, i) => multiply(value, power(bases[i]!, Number(exponent))),
      ONE,
    );
    return compare(product, ONE) === 0;
  });
}
