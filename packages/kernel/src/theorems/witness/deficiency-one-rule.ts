import type { Rational } from '../../exact/index.ts';
import {
  add,
  clearDenominators,
  matrixOfRows,
  negate,
  ONE,
  rational,
  rightNullspace,
  sign,
  subtract,
  ZERO,
} from '../../exact/index.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';
import type { PlainNetwork } from './plain-network.ts';
import { changeOf, components, deficiencyOf, leadsTo, nonterminal } from './plain-network.ts';
import type { Condition } from './programme.ts';
import { feasible, unit } from './programme.ts';

/** Sign patterns looked at in all cases together. */
const MOST_NODES = 4_000;

/**
 * A regular network of deficiency one in which no case of the deficiency one algorithm can be met, worked out again: for
 * every shelf of every terminal class, signs of μ are tried species by species, with σ in the span of the reactions.
 */
export function noSeveralByAlgorithm({ plain, holds }: Evidence): Finding {
  if (!holds) return 'it is never said to fail.';
  const groups = components(plain);
  if (deficiencyOf(plain, groups) !== 1) return 'the deficiency is not 1.';
  if (!isConsistent(plain)) return 'the network is not consistent.';
  const outside = nonterminal(plain);
  const terminal = groups.map((group) => group.filter((complex) => !outside.has(complex)));
  if (terminal.some((group) => group.some((complex) => !leadsTo(plain, group[0]!, complex))))
    return 'a component has several terminal classes.';
  const vector = deficiencyVector(plain, groups);
  const sum = (members: Iterable<number>): Rational =>
    [...members].reduce((total, complex) => add(total, vector[complex]!), ZERO);
  const flipped = terminal.some((group) => sign(sum(group)) < 0);
  const pairs = terminal.map((group) => pairsOf(plain, group, sum));
  if (pairs.some((list) => list === null)) return 'the network is not regular.';
  const classes = terminal.map((complexes, k) => ({ complexes, pairs: pairs[k]! }));
  const senses = outside.size === 0 ? [1, -1] : [flipped ? -1 : 1];
  const search: Search = { plain, nodes: 0 };
  for (const sense of senses) {
    for (let code = 0; code < 3 ** classes.length; code++) {
      const conditions = conditionsOf(plain, outside, classes, code, sense);
      const met = patternExists(search, conditions);
      if (met === null) return new Unconfirmed('there are too many sign patterns to try again.');
      if (met) return 'a case of the algorithm can be met.';
    }
  }
  return null;
}

interface Pair {
  readonly from: number;
  readonly to: number;
  /** Sign of the net flow from → to, before the sense of the vector. */
  readonly net: number;
}

/** The joined pairs of a terminal class with their net flows; null where cutting one does not separate its ends. */
function pairsOf(
  plain: PlainNetwork,
  group: readonly number[],
  sum: (members: Iterable<number>) => Rational,
): Pair[] | null {
  const pairs: Pair[] = [];
  for (const [k, from] of group.entries()) {
    for (const to of group.slice(k + 1)) {
      const joins = (a: number, b: number): boolean =>
        plain.reactions.some((reaction) => reaction.from === a && reaction.to === b);
      if (!joins(from, to) && !joins(to, from)) continue;
      const side = new Set([to]);
      for (const complex of side) {
        for (const { from: a, to: b } of plain.reactions) {
          if ((a === from && b === to) || (a === to && b === from)) continue;
          if (a === complex) side.add(b);
          if (b === complex) side.add(a);
        }
      }
      if (side.has(from)) return null;
      pairs.push({ from, to, net: sign(sum(side)) });
    }
  }
  return pairs;
}

/** A vector by complex that sums to 0 on every component and to 0 in every species. */
function deficiencyVector(plain: PlainNetwork, groups: readonly (readonly number[])[]): Rational[] {
  const rows = plain.species.map((name) => plain.complexes.map((complex) => complex.get(name) ?? ZERO));
  for (const group of groups) rows.push(plain.complexes.map((_, y) => (group.includes(y) ? ONE : ZERO)));
  const basis = rightNullspace(
    matrixOfRows(
      rows.map((row) => clearDenominators(row).integers),
      plain.complexes.length,
    ),
  );
  return basis[0]!.map((value) => rational(value));
}

/** Unknowns: μ by species, then the level M. */
function conditionsOf(
  plain: PlainNetwork,
  outside: ReadonlySet<number>,
  classes: readonly { readonly complexes: readonly number[]; readonly pairs: readonly Pair[] }[],
  code: number,
  sense: number,
): Condition[] {
  const height = (complex: number): Rational[] => [
    ...plain.species.map((name) => plain.complexes[complex]!.get(name) ?? ZERO),
    negate(ONE),
  ];
  const turned = (row: readonly Rational[], by: number): Rational[] =>
    row.map((value) => (by < 0 ? negate(value) : value));
  const conditions: Condition[] = [...outside].map((complex) => ({
    coefficients: height(complex),
    strict: false,
  }));
  classes.forEach(({ complexes, pairs }, k) => {
    const shelf = (Math.floor(code / 3 ** k) % 3) - 1;
    for (const complex of complexes)
      conditions.push({ coefficients: turned(height(complex), shelf), strict: shelf !== 0 });
    if (shelf === 0) return;
    for (const { from, to, net } of pairs) {
      const low = height(from);
      const rise = height(to).map((value, i) => subtract(value, low[i]!));
      conditions.push({ coefficients: turned(rise, net * sense * shelf), strict: net !== 0 });
    }
  });
  return conditions;
}

interface Search {
  readonly plain: PlainNetwork;
  nodes: number;
}

/** Whether some μ ≠ 0 meets the conditions and has the signs of a combination of reactions; null beyond the budget. */
function patternExists(search: Search, conditions: readonly Condition[]): boolean | null {
  const { plain } = search;
  const species = plain.species.length;
  const changes = plain.reactions.map((reaction) => changeOf(plain, reaction));
  const entry = (i: number): Rational[] => changes.map((change) => change.get(plain.species[i]!) ?? ZERO);
  const visit = (i: number, mu: Condition[], sigma: Condition[], moved: boolean): boolean | null => {
    if (++search.nodes > MOST_NODES) return null;
    if (!feasible(species + 1, [...conditions, ...mu]) || !feasible(changes.length, sigma)) return false;
    if (i === species) return moved;
    for (const way of [0, 1, -1] as const) {
      const strict = way !== 0;
      const own = { coefficients: unit(species + 1, i, way === -1 ? -1 : 1), strict };
      const other = {
        coefficients: way === -1 ? entry(i).map(negate) : entry(i),
        strict,
      };
      const found = visit(i + 1, [...mu, own], [...sigma, other], moved || strict);
      if (found !== false) return found;
    }
    return false;
  };
  return visit(0, [], [], false);
}

/** Whether some positive flux changes no species. */
function isConsistent(plain: PlainNetwork): boolean {
  const changes = plain.reactions.map((reaction) => changeOf(plain, reaction));
  return feasible(changes.length, [
    ...plain.species.map((name): Condition => ({
      coefficients: changes.map((change) => change.get(name) ?? ZERO),
      strict: false,
    })),
    ...changes.map((_, j): Condition => ({ coefficients: unit(changes.length, j, 1), strict: true })),
  ]);
}
