import type { LinearCondition, SparseVector } from '../exact/index.ts';
import { content, solveLinear } from '../exact/index.ts';
import type { ConservationLaws } from './conservation-laws.ts';
import type { SpeciesInequality } from './nonnegative-laws.ts';
import { orientedLaws, speciesInequalities } from './nonnegative-laws.ts';

/** Linear programmes beyond this many entries are not tried. */
const PROGRAMME_ENTRIES = 60_000;
/** Pivots times entries of one programme. */
const PROGRAMME_WORK = 2_000_000;

/**
 * Whether some law is positive at every species. `law` is one such; `outside` is a species at which every non-negative
 * law is 0; `holds` is null where the network is too large to be decided.
 */
export type Conservative =
  | { readonly holds: true; readonly law: SparseVector }
  | { readonly holds: false; readonly outside: number }
  | { readonly holds: null };

/** Decides conservativity from the laws, exactly. */
export function conservative(laws: ConservationLaws, speciesCount: number): Conservative {
  const missing = firstMissing(laws.basis, speciesCount);
  if (missing >= 0 && laws.complete) return { holds: false, outside: missing };
  const uncovered = firstMissing(laws.nonnegative, speciesCount);
  if (uncovered < 0) return { holds: true, law: sumOf(laws.nonnegative, speciesCount) };
  if (laws.nonnegativeComplete) return { holds: false, outside: uncovered };
  return laws.complete ? byProgramme(laws, speciesCount) : { holds: null };
}

function firstMissing(laws: readonly SparseVector[], speciesCount: number): number {
  const covered = new Uint8Array(speciesCount);
  for (const law of laws) for (const species of law.indices) covered[species] = 1;
  return covered.indexOf(0);
}

/**
 * Block by block: coefficients c of the laws with Σ c_j law_j > 0 at every species, or weights y ≥ 0 on the species, not
 * all 0, under which every law sums to 0: then a non-negative law is 0 wherever y is not (Gordan 1873). The programme is
 * put to the weights, whose tableau has one row per law instead of one per species.
 */
function byProgramme(laws: ConservationLaws, speciesCount: number): Conservative {
  const parts: SparseVector[] = [];
  for (const block of laws.blocks) {
    const oriented = orientedLaws(block);
    const inequalities = speciesInequalities(oriented);
    const entries = inequalities.length * oriented.length;
    if (entries > PROGRAMME_ENTRIES) return { holds: null };
    const outcome = solveLinear(
      { variables: inequalities.length, conditions: weightConditions(inequalities, oriented.length) },
      Math.ceil(PROGRAMME_WORK / entries),
    );
    if (outcome.kind === 'unfinished') return { holds: null };
    if (outcome.kind === 'feasible') {
      const zero = outcome.values.findIndex((weight) => weight > 0n);
      return { holds: false, outside: inequalities[zero]!.species };
    }
    oriented.forEach(({ indices, values }, j) => {
      const coefficient = -outcome.multipliers[j]!;
      if (coefficient === 0n) return;
      parts.push({ indices, values: values.map((value) => coefficient * value) });
    });
  }
  return { holds: true, law: sumOf(parts, speciesCount) };
}

/** Σ_i y_i law_j(i) = 0 for every law j, Σ y = 1. */
function weightConditions(inequalities: readonly SpeciesInequality[], lawCount: number): LinearCondition[] {
  const terms: (readonly [number, bigint])[][] = Array.from({ length: lawCount }, () => []);
  inequalities.forEach((inequality, i) => {
    for (const [j, value] of inequality.terms) terms[j]!.push([i, value]);
  });
  const all = inequalities.map((_, i) => [i, 1n] as const);
  return [
    ...terms.map((list): LinearCondition => ({ terms: list, relation: '=', right: 0n })),
    { terms: all, relation: '=', right: 1n },
  ];
}

function sumOf(laws: readonly SparseVector[], speciesCount: number): SparseVector {
  if (laws.length === 1) return laws[0]!;
  const sum = new Array<bigint>(speciesCount).fill(0n);
  for (const law of laws) law.indices.forEach((species, i) => (sum[species]! += law.values[i]!));
  const common = content(sum);
  const indices = Int32Array.from({ length: speciesCount }, (_, species) => species);
  return { indices, values: common > 1n ? sum.map((value) => value / common) : sum };
}
