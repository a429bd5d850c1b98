import type { LinearCondition, SparseVector } from '../exact/index.ts';
import { primitive, solveLinear } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { stoichiometry } from '../network/index.ts';
import type { ConservationLaws } from './conservation-laws.ts';
import { spanningForest } from './spanning-forest.ts';

/** Linear programmes beyond this many entries are not tried. */
const PROGRAMME_ENTRIES = 200_000;

/**
 * A minimal siphon; critical when it contains the support of no non-negative law (`null`: undecided). `law` is one with
 * its support inside, where there is one.
 */
export interface Siphon {
  readonly species: Int32Array;
  readonly critical: boolean | null;
  readonly law: SparseVector | null;
}

/** Judges siphons by the extreme non-negative laws, or by linear programmes where not all of those are known. */
export function judgeSiphons(
  network: StructuralNetwork,
  siphons: readonly Int32Array[],
  laws: ConservationLaws | null,
): Siphon[] {
  const byFirst = new Map<number, SparseVector[]>();
  for (const law of laws?.nonnegative ?? []) {
    const known = byFirst.get(law.indices[0]!);
    if (known) known.push(law);
    else byFirst.set(law.indices[0]!, [law]);
  }
  const mark = new Int32Array(network.species.length).fill(-1);
  return siphons.map((species, index) => {
    for (const member of species) mark[member] = index;
    for (const member of species) {
      for (const law of byFirst.get(member) ?? []) {
        if (law.indices.every((other) => mark[other] === index)) return { species, critical: false, law };
      }
    }
    return laws?.nonnegativeComplete ? { species, critical: true, law: null } : byProgramme(network, species);
  });
}

/** w ≥ 0 on the siphon, w·N = 0, Σ w = 1. */
function byProgramme(network: StructuralNetwork, species: Int32Array): Siphon {
  const place = new Map(Array.from(species, (member, i) => [member, i]));
  const { matrix } = stoichiometry(network, spanningForest(network));
  const conditions: LinearCondition[] = [];
  for (let column = 0; column < matrix.columnCount; column++) {
    const terms: (readonly [number, bigint])[] = [];
    for (let k = matrix.offsets[column]!; k < matrix.offsets[column + 1]!; k++) {
      const variable = place.get(matrix.rows[k]!);
      if (variable !== undefined) terms.push([variable, BigInt(matrix.values[k]!)]);
    }
    if (terms.length > 0) conditions.push({ terms, relation: '=', right: 0n });
  }
  if (conditions.length * species.length > PROGRAMME_ENTRIES) return { species, critical: null, law: null };
  conditions.push({
    terms: Array.from(species, (_, i) => [i, 1n] as const),
    relation: '=',
    right: 1n,
  });
  const outcome = solveLinear({ variables: species.length, conditions });
  if (outcome.kind === 'unfinished') return { species, critical: null, law: null };
  if (outcome.kind === 'infeasible') return { species, critical: true, law: null };
  const support = species.filter((_, i) => outcome.values[i] !== 0n);
  const values = primitive(outcome.values.filter((value) => value !== 0n));
  return { species, critical: false, law: { indices: support, values } };
}
