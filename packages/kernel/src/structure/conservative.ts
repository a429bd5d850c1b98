import type { SparseVector } from '../exact/index.ts';
import { content, solveLinear } from '../exact/index.ts';
import type { ConservationLaws } from './conservation-laws.ts';
import { orientedLaws, speciesInequalities } from './nonnegative-laws.ts';

/** Linear programmes beyond this many entries are not tried. */
const PROGRAMME_ENTRIES = 400_000;

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

/** Block by block: coefficients c of the laws with Σ c_j law_j ≥ 1 everywhere. */
function byProgramme(laws: ConservationLaws, speciesCount: number): Conservative {
  const parts: SparseVector[] = [];
  for (const block of laws.blocks) {
    const oriented = orientedLaws(block);
    const inequalities = speciesInequalities(oriented);
    if (inequalities.length * oriented.length > PROGRAMME_ENTRIES) return { holds: null };
    const outcome = solveLinear({
      variables: oriented.length,
      conditions: inequalities.map(({ terms }) => ({ terms, relation: '>=' as const, right: 1n })),
    });
    if (outcome.kind === 'unfinished') return { holds: null };
    if (outcome.kind === 'infeasible') {
      // Where a multiplier is positive every non-negative law is 0.
      const zero = outcome.multipliers.findIndex((multiplier) => multiplier > 0n);
      return { holds: false, outside: inequalities[zero]!.species };
    }
    for (const [j, law] of oriented.entries()) {
      const coefficient = outcome.values[j]!;
      if (coefficient !== 0n) {
        parts.push({ indices: law.indices, values: law.values.map((value) => coefficient * value) });
      }
    }
  }
  return { holds: true, law: sumOf(parts, speciesCount) };
}

function sumOf(laws: readonly SparseVector[], speciesCount: number): SparseVector {
  if (laws.length === 1) return laws[0]!;
  const sum = new Array<bigint>(speciesCount).fill(0n);
  for (const law of laws) law.indices.forEach((species, i) => (sum[species]! += law.values[i]!));
  const common = content(sum);
  const indices = Int32Array.from({ length: speciesCount }, (_, species) => species);
  return { indices, values: common > 1n ? sum.map((value) => value / common) : sum };
}
