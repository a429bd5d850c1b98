import * as z from 'zod/mini';
import type { ResultUnits } from './network.ts';
import { cellReference } from './settings.ts';
import type { Verdict, VerdictId, Applies } from './verdict.ts';

/** Settings of a structure cell: the network it reads, and variants to set beside it. */
export const structureSettings = z.strictObject({
  network: cellReference,
  compare: z.optional(z.array(cellReference).check(z.maxLength(8))),
});

export type StructureSettings = z.infer<typeof structureSettings>;

/** Integer, or a decimal string beyond 2^53; rationals are "3/2". */
export type ExactNumber = number | string;

/** Exact coefficients by species name; absent is 0. */
export type BySpecies = Readonly<Record<string, ExactNumber>>;

/** The figures of a network. `rank` and `deficiency` are proven, or null with a note where the network is too large. */
export interface StructureCounts {
  readonly species: number;
  readonly complexes: number;
  /** Distinct directed arrows: `<=>` is two, equal rows are one. */
  readonly reactions: number;
  readonly linkageClasses: number;
  readonly strongLinkageClasses: number;
  readonly terminalStrongLinkageClasses: number;
  readonly rank: number | null;
  readonly deficiency: number | null;
}

/** A written reaction; several may state the same arrow (equal rows). */
export interface StructureReaction {
  /** Index of its row among the rows of the text, from 0. */
  readonly row: number;
  /** "E + S -> ES". */
  readonly label: string;
  /** Indices of complexes. */
  readonly from: number;
  readonly to: number;
  /** Name of its constant; null where a law stands in its place. */
  readonly constant: string | null;
  /** The first reaction with the sides exchanged, or null. */
  readonly reverse: number | null;
  readonly law: 'mass action' | 'other';
}

export interface LinkageClass {
  readonly complexes: readonly number[];
  readonly rank: number | null;
  readonly deficiency: number | null;
  readonly terminalStrongLinkageClasses: number;
  readonly weaklyReversible: boolean;
}

/** A linear function of the species that no reaction changes. */
export interface ConservationLaw {
  /** "T1", "T2", …: stable for a text. */
  readonly id: string;
  /** Primitive integer coefficients; absent above the limit of lists, where `of` is shortened. */
  readonly law?: BySpecies;
  /** "E + ES". */
  readonly of: string;
  /** Number of species in it. */
  readonly terms: number;
}

/** A minimal siphon; critical when it contains the support of no non-negative law, null where undecided. */
export interface MinimalSiphon {
  readonly species: readonly string[];
  readonly critical: boolean | null;
  /** A non-negative law with its support inside the siphon. */
  readonly law?: BySpecies;
}

/** A matrix as a table of exact entries (or sums of constants as text), with its LaTeX. */
export interface MatrixTable {
  readonly rows: readonly string[];
  readonly columns: readonly string[];
  readonly entries: readonly (readonly ExactNumber[])[];
  readonly tex: string;
}

/** Y: species by complexes. I_a: complexes by arrows. N = Y·I_a. A_k: complexes by complexes, dx/dt = Y A_k Ψ(x). */
export interface StructureMatrices {
  readonly Y: MatrixTable;
  readonly Ia: MatrixTable;
  readonly N: MatrixTable;
  /** Absent where some rate is not mass action. */
  readonly Ak?: MatrixTable;
}

/** What another network has otherwise. */
export interface StructureComparison {
  /** Name of the cell. */
  readonly network: string;
  readonly counts: StructureCounts;
  readonly reversible: boolean;
  readonly weaklyReversible: boolean;
  readonly conservative: boolean | null;
  readonly consistent: boolean | null;
  /** Arrows of this network that the compared one lacks, and the other way round, as labels; at most 200 each. */
  readonly onlyHere: readonly string[];
  readonly onlyThere: readonly string[];
  /** Verdicts that differ. */
  readonly verdicts: readonly { readonly id: VerdictId; readonly here: Applies; readonly there: Applies }[];
}

/**
 * What a network's structure alone proves. Species stand in order of first appearance, complexes likewise, reactions in
 * order of writing; indices are 0-based. With `fix`, all of it is about the reduced network and `asWritten` holds the counts
 * of the text. Above 20,000 complexes the long lists are absent and `listed` is false.
 */
export interface StructureResult {
  readonly species?: readonly string[];
  readonly complexes?: readonly { readonly label: string; readonly of: BySpecies }[];
  readonly reactions?: readonly StructureReaction[];
  readonly counts: StructureCounts;
  readonly asWritten?: StructureCounts;
  readonly reduced: boolean;
  readonly reversible: boolean;
  readonly weaklyReversible: boolean;
  readonly linkageClasses?: readonly LinkageClass[];
  readonly terminalStrongClasses?: readonly (readonly number[])[];
  readonly nonterminalComplexes?: readonly number[];
  /** A basis, extreme non-negative laws first. */
  readonly conservationLaws: readonly ConservationLaw[];
  /** All extreme non-negative laws, as far as `complete` says. */
  readonly nonnegativeConservationLaws: readonly BySpecies[];
  /** A law that is positive at every species, where there is one and not all extreme laws are listed. */
  readonly positiveLaw?: BySpecies;
  /** Some law is positive at every species. */
  readonly conservative: boolean | null;
  /** Some positive flux leaves every species balanced. */
  readonly consistent: boolean | null;
  readonly siphons: readonly MinimalSiphon[];
  readonly robustSpecies: readonly string[];
  readonly verdicts: readonly Verdict[];
  /** Whether each list that may be cut is whole. */
  readonly complete: {
    readonly conservationLaws: boolean;
    readonly nonnegativeConservationLaws: boolean;
    readonly siphons: boolean;
  };
  /** Sentences on what was cut, reduced or too large. */
  readonly notes: readonly string[];
  readonly matrices?: StructureMatrices;
  /** Rate equations, typeset: d of/dt = tex. */
  readonly equations?: readonly { readonly of: string; readonly tex: string }[];
  readonly comparisons?: readonly StructureComparison[];
  readonly listed?: false;
  readonly units: ResultUnits | null;
}
