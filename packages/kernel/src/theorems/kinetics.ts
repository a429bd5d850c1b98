import type { StructuralNetwork } from '../network/index.ts';
import { growsWithReactants, risesWithReactants, vanishesWithReactants } from './law-shape.ts';

/** What can be read off the rate laws. Reactions are indices of the structure result. */
export interface KineticsReport {
  /** What besides reactions changes a species, as part of a sentence; null where nothing does. */
  readonly interventions: string | null;
  /** A reaction whose law is not mass action, or null. */
  readonly otherLaw: number | null;
  /**
   * A reaction with a law that is mass action in rate equations but not in counts, because it takes several molecules of
   * one species (k·A^2 is not k·n(n − 1)); or null.
   */
  readonly unlikeInCounts: number | null;
  /** A reaction whose law is not visibly positive exactly when all its reactants are present, or null. */
  readonly unclearLaw: number | null;
  /** A reaction whose law does not visibly stay or grow when a reactant is added, or null. */
  readonly unclearGrowth: number | null;
  /** A reaction whose law does not visibly rise strictly with each of its reactants, or null. */
  readonly unclearRise: number | null;
}

/** Reads the laws of all reactions; stops at the first of each kind. */
export function reportKinetics(structure: StructuralNetwork): KineticsReport {
  const { source, reactions } = structure;
  let otherLaw: number | null = null;
  let unlikeInCounts: number | null = null;
  let unclearLaw: number | null = null;
  let unclearGrowth: number | null = null;
  let unclearRise: number | null = null;
  for (let reaction = 0; reaction < reactions.count; reaction++) {
    const written = reactions.source[reaction]!;
    const law = source.laws[source.reactions.law[written]!];
    if (law === undefined) continue;
    if (law.massAction !== null) {
      if (unlikeInCounts === null && takesSeveral(structure, written)) unlikeInCounts = reaction;
      continue;
    }
    otherLaw ??= reaction;
    if (unclearLaw !== null && unclearGrowth !== null && unclearRise !== null) continue;
    const reactants = reactantNames(structure, written);
    if (law.net || !vanishesWithReactants(law.expression, reactants, source)) unclearLaw ??= reaction;
    if (law.net || !growsWithReactants(law.expression, reactants, source)) unclearGrowth ??= reaction;
    if (law.net || !risesWithReactants(law.expression, reactants, source)) unclearRise ??= reaction;
  }
  return {
    interventions: interventionsOf(structure),
    otherLaw,
    unlikeInCounts,
    unclearLaw,
    unclearGrowth,
    unclearRise,
  };
}

function takesSeveral({ source }: StructuralNetwork, reaction: number): boolean {
  const { offsets, numerators } = source.complexes;
  const complex = source.reactions.from[reaction]!;
  return numerators.subarray(offsets[complex], offsets[complex + 1]).some((coefficient) => coefficient > 1);
}

function interventionsOf({ source }: StructuralNetwork): string | null {
  const ruled = [...source.rateRules.keys()].map((species) => source.species[species]!);
  if (ruled.length > 0) return `${ruled.join(', ')} follows an equation of its own`;
  return source.events.length > 0 ? `line ${source.events[0]!.line} states an event` : null;
}

function reactantNames({ source }: StructuralNetwork, reaction: number): ReadonlySet<string> {
  const { offsets, species } = source.complexes;
  const complex = source.reactions.from[reaction]!;
  const names = new Set<string>();
  for (let k = offsets[complex]!; k < offsets[complex + 1]!; k++) {
    if (!source.fixed.has(species[k]!)) names.add(source.species[species[k]!]!);
  }
  return names;
}
