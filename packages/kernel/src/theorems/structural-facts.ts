import { solveLinear } from '../exact/index.ts';
import type { SparseVector } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import type { ConservationLaws } from '../structure/conservation-laws.ts';
import { conservationLaws } from '../structure/conservation-laws.ts';
import { linkageClasses } from '../structure/linkage-classes.ts';
import type { MinimalSiphons } from '../structure/minimal-siphons.ts';
import { minimalSiphons } from '../structure/minimal-siphons.ts';
import type { Partition } from '../structure/partition.ts';
import { membersOf } from '../structure/partition.ts';
import { ranksOfClasses } from '../structure/ranks-of-classes.ts';
import { spanningForest } from '../structure/spanning-forest.ts';
import {
  nonterminalComplexes,
  strongLinkageClasses,
  terminalFlags,
} from '../structure/strong-linkage-classes.ts';

/** A linkage class with the quantities theorems ask for; null where its rank could not be decided. */
export interface LinkageClassFacts {
  readonly complexes: readonly number[];
  readonly deficiency: number | null;
  readonly terminalStrongClasses: readonly (readonly number[])[];
}

/** A minimal siphon; `law` is a non-negative one supported in it, by species, where it is not critical. */
export interface SiphonFacts {
  readonly species: readonly number[];
  readonly critical: boolean;
  readonly law: SparseVector | null;
}

/** What the structure room has found out about a network, each part when first asked for. */
export class StructuralFacts {
  readonly #network: StructuralNetwork;
  readonly #linkage: Partition;
  readonly #strong: Partition;
  readonly #terminal: Uint8Array;
  #laws: ConservationLaws | null | undefined;
  #classes: LinkageClassFacts[] | undefined;
  #siphons: { siphons: SiphonFacts[]; complete: boolean } | undefined;

  constructor(network: StructuralNetwork, known: { readonly laws?: ConservationLaws | null } = {}) {
    this.#network = network;
    this.#laws = known.laws;
    this.#linkage = linkageClasses(network);
    this.#strong = strongLinkageClasses(network);
    this.#terminal = terminalFlags(network, this.#strong);
  }

  /** Null where the network is too large for a proven rank. */
  get laws(): ConservationLaws | null {
    if (this.#laws === undefined) this.#laws = conservationLaws(this.#network);
    return this.#laws;
  }

  get rank(): number | null {
    return this.laws?.rank ?? null;
  }

  get deficiency(): number | null {
    return this.rank === null ? null : this.#network.complexes.count - this.#linkage.count - this.rank;
  }

  /** Class of each complex. */
  get strongClassOf(): Int32Array {
    return this.#strong.of;
  }

  get linkageClassOf(): Int32Array {
    return this.#linkage.of;
  }

  get nonterminalComplexes(): number[] {
    return Array.from(nonterminalComplexes(this.#strong, this.#terminal));
  }

  get linkageClasses(): readonly LinkageClassFacts[] {
    this.#classes ??= this.#describeClasses();
    return this.#classes;
  }

  /** Minimal siphons, critical or not. */
  get siphons(): { readonly siphons: readonly SiphonFacts[]; readonly complete: boolean } {
    if (this.#siphons === undefined) {
      const { siphons, complete } = minimalSiphons(this.#network);
      const described = siphons.map((siphon) => this.#describeSiphon(siphon));
      this.#siphons = {
        siphons: described.flatMap((siphon) => siphon ?? []),
        complete: complete && !described.includes(null),
      };
    }
    return this.#siphons;
  }

  #describeClasses(): LinkageClassFacts[] {
    const ranks =
      this.rank === null
        ? null
        : ranksOfClasses(this.#network, this.#linkage, spanningForest(this.#network), this.rank);
    const terminal: number[][][] = Array.from({ length: this.#linkage.count }, () => []);
    for (let group = 0; group < this.#strong.count; group++) {
      if (this.#terminal[group] === 0) continue;
      const members = Array.from(membersOf(this.#strong, group));
      terminal[this.#linkage.of[members[0]!]!]!.push(members);
    }
    return terminal.map((terminalStrongClasses, group) => {
      const complexes = Array.from(membersOf(this.#linkage, group));
      const rank = ranks?.[group] ?? null;
      return {
        complexes,
        deficiency: rank === null ? null : complexes.length - 1 - rank,
        terminalStrongClasses,
      };
    });
  }

  /** Null where it could not be decided whether a law lies in the siphon. */
  #describeSiphon(siphon: MinimalSiphons['siphons'][number]): SiphonFacts | null {
    const species = Array.from(siphon);
    const members = new Set(species);
    const law = this.laws?.nonnegative.find(({ indices }) => indices.every((i) => members.has(i))) ?? null;
    if (law !== null) return { species, critical: false, law };
    if (this.laws?.nonnegativeComplete) return { species, critical: true, law: null };
    return this.#lawWithin(species, members);
  }

  #lawWithin(species: readonly number[], members: ReadonlySet<number>): SiphonFacts | null {
    if (this.laws?.complete !== true) return null;
    const { basis } = this.laws;
    // Coefficients c of the basis with Σ c w zero outside the siphon, not negative inside, of sum 1.
    const terms = new Map<number, [number, bigint][]>();
    basis.forEach((vector, j) => {
      vector.indices.forEach((i, k) => terms.set(i, [...(terms.get(i) ?? []), [j, vector.values[k]!]]));
    });
    const sum = basis.map((vector, j): [number, bigint] => [
      j,
      vector.values.reduce((total, value) => total + value, 0n),
    ]);
    const outcome = solveLinear({
      variables: basis.length,
      free: () => true,
      conditions: [
        ...[...terms].map(([i, list]) => ({
          terms: list,
          relation: members.has(i) ? ('>=' as const) : ('=' as const),
          right: 0n,
        })),
        { terms: sum, relation: '>=', right: 1n },
      ],
    });
    if (outcome.kind === 'unfinished') return null;
    if (outcome.kind === 'infeasible') return { species: [...species], critical: true, law: null };
    const values = species.map((i) =>
      (terms.get(i) ?? []).reduce((total, [j, value]) => total + value * outcome.values[j]!, 0n),
    );
    return { species: [...species], critical: false, law: { indices: Int32Array.from(species), values } };
  }
}
