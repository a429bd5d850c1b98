import type { SparseVector } from '../exact/index.ts';
import { content, primitive } from '../exact/index.ts';
import type { Inequality, Ray, RayLimits } from './extreme-rays.ts';
import { extremeRays } from './extreme-rays.ts';
import type { LawBlock } from './law-blocks.ts';

/** The extreme non-negative laws of a block, or none and `complete: false` beyond the limits. */
export interface NonnegativeLaws {
  readonly laws: readonly SparseVector[];
  readonly complete: boolean;
  /** Elementary steps taken. */
  readonly steps: number;
}

/**
 * Extreme rays of the cone of non-negative laws of a block. In the coordinates c of w = Σ c_j law_j (each law oriented to
 * be positive at its own species) the cone is c ≥ 0 together with w_i ≥ 0 for every other species i.
 */
export function nonnegativeLawsOf(block: LawBlock, limits: RayLimits): NonnegativeLaws {
  if (block.laws.length === 1) {
    const law = block.laws[0]!;
    return { laws: oneSigned(law) ? [law] : [], complete: true, steps: 0 };
  }
  const oriented = orientedLaws(block);
  const inequalities = speciesInequalities(oriented).map(({ terms }) => terms);
  const { rays, steps } = extremeRays(oriented.length, inequalities, limits);
  if (rays === null) return { laws: [], complete: false, steps };
  return { laws: rays.map((ray) => combination(oriented, ray)), complete: true, steps };
}

/** The laws of a block, each with the sign that makes it positive at its own species. */
export function orientedLaws(block: LawBlock): SparseVector[] {
  return block.laws.map((law, j) => {
    const value = law.values[law.indices.indexOf(block.own[j]!)]!;
    return value > 0n ? law : { indices: law.indices, values: law.values.map((entry) => -entry) };
  });
}

/** w_species ≥ 0 as an inequality on the coefficients of laws. */
export interface SpeciesInequality {
  readonly species: number;
  readonly terms: Inequality;
}

/** Non-negativity of each species as an inequality on the coefficients of the laws; parallel ones once. */
export function speciesInequalities(laws: readonly SparseVector[]): SpeciesInequality[] {
  const bySpecies = new Map<number, [number, bigint][]>();
  laws.forEach((law, j) => {
    law.indices.forEach((species, i) => {
      const terms = bySpecies.get(species);
      if (terms) terms.push([j, law.values[i]!]);
      else bySpecies.set(species, [[j, law.values[i]!]]);
    });
  });
  const distinct = new Map<string, SpeciesInequality>();
  for (const [species, terms] of bySpecies) {
    const common = content(terms.map(([, value]) => value));
    const reduced = terms.map(([j, value]) => [j, value / common] as const);
    const key = reduced.map(([j, value]) => `${j}:${value}`).join();
    if (!distinct.has(key)) distinct.set(key, { species, terms: reduced });
  }
  return [...distinct.values()];
}

function oneSigned(law: SparseVector): boolean {
  return law.values.every((value) => value > 0n);
}

function combination(laws: readonly SparseVector[], ray: Ray): SparseVector {
  const sum = new Map<number, bigint>();
  for (const [j, coefficient] of ray) {
    const law = laws[j]!;
    law.indices.forEach((species, i) => {
      sum.set(species, (sum.get(species) ?? 0n) + coefficient * law.values[i]!);
    });
  }
  const entries = [...sum].filter(([, value]) => value !== 0n).sort(([a], [b]) => a - b);
  return {
    indices: Int32Array.from(entries, ([species]) => species),
    values: primitive(entries.map(([, value]) => value)),
  };
}
