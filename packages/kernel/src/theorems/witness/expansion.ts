import { toDouble } from '../../exact/index.ts';
import type { PlainNetwork } from './plain-network.ts';
import { changeOf, dimension } from './plain-network.ts';

/** A product of unknowns (their numbers, ascending and joined), with its coefficient. */
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
 * kept apart. Rows are expanded one by one, with memory over the columns used. Null beyond the limits.
 */
export function signsOfMinors(rows: readonly (readonly Entry[])[], size: number): Signs | null {
  const species = rows.length;
  if (species > 26) return null;
  let steps = 0;
  let positive = false;
  let negative = false;
  const expand = (chosen: readonly number[]): boolean => {
    const allowed = chosen.reduce((bits, i) => bits | (1 << i), 0);
    let layer = new Map<number, Polynomial>([[0, new Map([['', 1]])]]);
    for (const row of chosen) {
      const next = new Map<number, Polynomial>();
      for (const [used, polynomial] of layer) {
        for (const { column, unknown, coefficient } of rows[row]!) {
          if (!(allowed & (1 << column)) || used & (1 << column)) continue;
          const sense = inversions(used, column) % 2 === 0 ? 1 : -1;
          const key = used | (1 << column);
          const target = next.get(key) ?? new Map<string, number>();
          next.set(key, target);
          for (const [monomial, value] of polynomial) {
            if (++steps > MOST_STEPS) return false;
            const product = withUnknown(monomial, unknown);
            const sum = (target.get(product) ?? 0) + sense * coefficient * value;
            if (Math.abs(sum) > LARGEST) return false;
            target.set(product, sum);
          }
        }
      }
      layer = next;
    }
    for (const value of layer.get(allowed)?.values() ?? []) {
      if (value > 0) positive = true;
      if (value < 0) negative = true;
    }
    return true;
  };
  const choose = (from: number, chosen: number[]): boolean => {
    if (chosen.length === size) return expand(chosen);
    for (let i = from; i <= species - (size - chosen.length); i++) {
      if (++steps > MOST_STEPS || !choose(i + 1, [...chosen, i])) return false;
    }
    return true;
  };
  return choose(0, []) ? { positive, negative } : null;
}

function inversions(used: number, column: number): number {
  let count = 0;
  for (let bits = used >> (column + 1); bits > 0; bits >>= 1) count += bits & 1;
  return count;
}

function withUnknown(monomial: string, unknown: number): string {
  const list = monomial === '' ? [] : monomial.split(' ').map(Number);
  list.push(unknown);
  list.sort((a, b) => a - b);
  return list.join(' ');
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
