import { toDouble } from '../../exact/index.ts';
import type { PlainNetwork } from './plain-network.ts';
import { changeOf, dimension } from './plain-network.ts';

/** Coefficients by product of unknowns. */
type Polynomial = Map<string, number>;

/** One way in which a species enters a rate: N[row] · unknown · weight. */
export interface Entry {
  readonly column: number;
  readonly unknown: number;
  readonly coefficient: number;
}

/** Steps of one expansion, and numbers up to which doubles are exact. */
const MOST_STEPS = 1_500_000;
const LARGEST = 2 ** 50;

/** Signs met among the coefficients of a polynomial. */
export interface Signs {
  readonly positive: boolean;
  readonly negative: boolean;
}

/**
 * The signs of all coefficients of the sum of the principal s-minors of a matrix whose entries are linear forms in
 * unknowns, s the rank: the determinant on the stoichiometric subspace, times the unknown sizes of the species, which are
 * kept apart. Rows are expanded one by one or left out together with their column, with memory over the columns used and
 * the rows left out. Null beyond the limits.
 */
export function signsOfMinors(rows: readonly (readonly Entry[])[], size: number): Signs | null {
  const species = rows.length;
  if (species > MOST_SPECIES) return null;
  let steps = 0;
  let layer = new Map<number, Polynomial>([[0, new Map([['', 1]])]]);
  for (const [row, entries] of rows.entries()) {
    const next = new Map<number, Polynomial>();
    for (const [key, polynomial] of layer) {
      const used = key % COLUMNS;
      const left = (key - used) / COLUMNS;
      if (bitsOf(left) < species - size && !(used & (1 << row))) {
        next.set(key + COLUMNS * 2 ** row, polynomial);
        steps += 1;
      }
      for (const { column, unknown, coefficient } of entries) {
        if ((used | left) & (1 << column)) continue;
        const signed = bitsOf(used >> (column + 1)) % 2 === 0 ? coefficient : -coefficient;
        const target = next.get(key + 2 ** column) ?? new Map<string, number>();
        next.set(key + 2 ** column, target);
        for (const [monomial, value] of polynomial) {
          if (++steps > MOST_STEPS) return null;
          const product = withUnknown(monomial, unknown);
          const sum = (target.get(product) ?? 0) + signed * value;
          if (Math.abs(sum) > LARGEST) return null;
          target.set(product, sum);
        }
      }
    }
    layer = next;
  }
  let positive = false;
  let negative = false;
  for (const [key, polynomial] of layer) {
    const used = key % COLUMNS;
    // Exactly the columns of the rows that were not left out.
    if (used + (key - used) / COLUMNS !== 2 ** species - 1) continue;
    for (const value of polynomial.values()) {
      if (value > 0) positive = true;
      if (value < 0) negative = true;
    }
  }
  return { positive, negative };
}

const MOST_SPECIES = 26;
const COLUMNS = 2 ** MOST_SPECIES;

function bitsOf(bits: number): number {
  let count = 0;
  for (let rest = bits; rest > 0; rest >>= 1) count += rest & 1;
  return count;
}

/** The monomial times one more unknown: unknowns are letters, kept in order. */
function withUnknown(monomial: string, unknown: number): string {
  const letter = String.fromCharCode(unknown + 1);
  let at = monomial.length;
  while (at > 0 && monomial[at - 1]! > letter) at--;
  return monomial.slice(0, at) + letter + monomial.slice(at);
}

/** Which unknowns the rates of a network carry: one for each arrow, or one for each arrow and reactant. */
export type UnknownsBy = 'arrow' | 'arrow and reactant';

/** N diag(κ) B, or N Z with any positive Z of the pattern of B, as rows of entries; null with coefficients that are fractions. */
export function jacobianEntries(plain: PlainNetwork, by: UnknownsBy): Entry[][] | null {
  const rows: Entry[][] = plain.species.map(() => []);
  const seen = new Set<string>();
  for (const [index, reaction] of plain.reactions.entries()) {
    const key = `${reaction.from} ${reaction.to}`;
    if (seen.has(key)) continue;
    seen.add(key);
    for (const [name, amount] of changeOf(plain, reaction)) {
      for (const [reactant, molecules] of plain.complexes[reaction.from]!) {
        if (amount.denominator !== 1n || molecules.denominator !== 1n) return null;
        const column = plain.species.indexOf(reactant);
        rows[plain.species.indexOf(name)]!.push({
          column,
          unknown: by === 'arrow' ? index : index * plain.species.length + column,
          coefficient: toDouble(amount) * (by === 'arrow' ? toDouble(molecules) : 1),
        });
      }
    }
  }
  return rows;
}

/** The rank of the stoichiometric matrix. */
export function rankOf(plain: PlainNetwork): number {
  return dimension(plain.reactions.map((reaction) => changeOf(plain, reaction)));
}

/** The entries of N diag(Σ λ_r E_r) B, for fluxes E_r by arrow "from to". */
export function fluxEntries(
  plain: PlainNetwork,
  rays: readonly ReadonlyMap<string, number>[],
): Entry[][] | null {
  const plainEntries = jacobianEntries(plain, 'arrow');
  return (
    plainEntries?.map((row) =>
      row.flatMap(({ column, unknown, coefficient }) => {
        const { from, to } = plain.reactions[unknown]!;
        return rays.flatMap((ray, r) => {
          const value = ray.get(`${from} ${to}`) ?? 0;
          return value === 0 ? [] : [{ column, unknown: r, coefficient: coefficient * value }];
        });
      }),
    ) ?? null
  );
}
