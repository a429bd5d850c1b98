import type { LinearCondition, RowIndex, SparseColumns, SparseVector } from '../exact/index.ts';
import { primitive, rowIndex, solveLinear } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { stoichiometry } from '../network/index.ts';
import type { ConservationLaws } from './conservation-laws.ts';
import { spanningForest } from './spanning-forest.ts';

/** Entries (conditions × variables) of one linear programme, and of all of them together, beyond which none is tried. */
const PROGRAMME_ENTRIES = 50_000;
const ALL_ENTRIES = 2_000_000;

/**
 * A minimal siphon; critical when it contains the support of no non-negative law (`null`: undecided). `law` is one with
 * its support inside, where there is one.
 */
export interface Siphon {
  readonly species: Int32Array;
  readonly critical: boolean | null;
  readonly law: SparseVector | null;
}

/** Judges siphons by the non-negative laws that are known, or by linear programmes where not all of those are. */
export function judgeSiphons(
  network: StructuralNetwork,
  siphons: readonly Int32Array[],
  laws: ConservationLaws | null,
  checkpoint: () => void = () => undefined,
): Siphon[] {
  const known = [...(laws?.nonnegative ?? []), ...(laws?.basis ?? []).filter(isNonnegative)];
  const byFirst = new Map<number, SparseVector[]>();
  for (const law of known) {
    const same = byFirst.get(law.indices[0]!);
    if (same) same.push(law);
    else byFirst.set(law.indices[0]!, [law]);
  }
  const mark = new Int32Array(network.species.length).fill(-1);
  let programmes: SupportProgrammes | null = null;
  return siphons.map((species, index) => {
    for (const member of species) mark[member] = index;
    for (const member of species) {
      for (const law of byFirst.get(member) ?? []) {
        if (law.indices.every((other) => mark[other] === index)) return { species, critical: false, law };
      }
    }
    if (laws?.nonnegativeComplete) return { species, critical: true, law: null };
    checkpoint();
    programmes ??= new SupportProgrammes(network);
    return programmes.judge(species);
  });
}

function isNonnegative(law: SparseVector): boolean {
  return law.values.every((value) => value > 0n);
}

/** Decides by exact linear programmes whether a set of species holds the support of a non-negative law. */
class SupportProgrammes {
  readonly #matrix: SparseColumns;
  readonly #byRow: RowIndex;
  #entries = 0;

  constructor(network: StructuralNetwork) {
    this.#matrix = stoichiometry(network, spanningForest(network)).matrix;
    this.#byRow = rowIndex(this.#matrix);
  }

  /** w ≥ 0 on the species, w·N = 0, Σ w = 1. */
  judge(species: Int32Array): Siphon {
    const conditions = this.#conditions(species);
    const entries = conditions.length * species.length;
    this.#entries += entries;
    const undecided: Siphon = { species, critical: null, law: null };
    if (entries > PROGRAMME_ENTRIES || this.#entries > ALL_ENTRIES) return undecided;
    const outcome = solveLinear({ variables: species.length, conditions });
    if (outcome.kind === 'unfinished') return undecided;
    if (outcome.kind === 'infeasible') return { species, critical: true, law: null };
    const indices = species.filter((_, i) => outcome.values[i] !== 0n);
    const values = primitive(outcome.values.filter((value) => value !== 0n));
    return { species, critical: false, law: { indices, values } };
  }

  #conditions(species: Int32Array): LinearCondition[] {
    const { offsets, columns, positions } = this.#byRow;
    const terms = new Map<number, (readonly [number, bigint])[]>();
    species.forEach((row, variable) => {
      for (let k = offsets[row]!; k < offsets[row + 1]!; k++) {
        const term = [variable, BigInt(this.#matrix.values[positions[k]!]!)] as const;
        const column = terms.get(columns[k]!);
        if (column) column.push(term);
        else terms.set(columns[k]!, [term]);
      }
    });
    const balanced = [...terms.values()].map((column): LinearCondition => ({
      terms: column,
      relation: '=',
      right: 0n,
    }));
    const all = Array.from(species, (_, variable) => [variable, 1n] as const);
    return [...balanced, { terms: all, relation: '=', right: 1n }];
  }
}
