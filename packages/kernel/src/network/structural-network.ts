import type { ComplexTable, Network } from '@stillroom/shared/network';
import type { Adjacency } from './adjacency.ts';
import type { ArrowTable, KeptReactions } from './merge-arrows.ts';
import { mergeArrows } from './merge-arrows.ts';
import { strikeOut } from './strike-out.ts';

/**
 * What structure is computed on: complexes and distinct directed arrows, after species held constant by `fix` (and
 * species that follow a `rate` equation of their own) have been struck out of every complex, complexes and arrows that
 * became equal merged, and arrows whose sides became equal dropped. All indices of structure results refer to it.
 */
export interface StructuralNetwork {
  readonly source: Network;
  /** Names of the species that stay, in order of first appearance. */
  readonly species: readonly string[];
  /** For each species that stays, its index in `source.species`. */
  readonly sourceSpecies: Int32Array;
  /** Distinct complexes that some arrow uses, in order of first appearance. */
  readonly complexes: ComplexTable;
  /** Every written reaction that stays (equal rows are kept), in order of writing. */
  readonly reactions: KeptReactions;
  /** Distinct directed arrows, in order of first writing. */
  readonly arrows: ArrowTable;
  /** Arrows by the complex they leave and by the complex they enter. */
  readonly outgoing: Adjacency;
  readonly incoming: Adjacency;
  /** Whether striking out changed the network that was written. */
  readonly reduced: boolean;
  /** Sentences for people about what the reduction dropped. */
  readonly warnings: readonly string[];
}

/** Builds the structural network of a network; time and space linear in its size. */
export function structuralNetwork(network: Network): StructuralNetwork {
  const struck = strikeOut(network);
  return {
    source: network,
    species: struck.species,
    sourceSpecies: struck.sourceSpecies,
    complexes: struck.complexes,
    ...mergeArrows(struck.reactions, struck.complexes.count),
    reduced: struck.reduced,
    warnings: struck.warnings,
  };
}

/** The structural network of the text as written, as though nothing were held constant. */
export function structuralNetworkAsWritten(network: Network): StructuralNetwork {
  return structuralNetwork({ ...network, fixed: new Map() });
}
