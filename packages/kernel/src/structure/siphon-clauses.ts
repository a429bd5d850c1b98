import type { StructuralNetwork } from '../network/index.ts';

/**
 * What makes a set Z a siphon: for each clause, product ∈ Z requires Z to meet `reactants`. Clauses with the product
 * among the reactants always hold and are left out, equal ones are kept once.
 */
export interface SiphonClauses {
  readonly speciesCount: number;
  readonly count: number;
  readonly product: Int32Array;
  /** Reactants of clause c: `reactants[offsets[c] .. offsets[c+1]-1]`. */
  readonly offsets: Int32Array;
  readonly reactants: Int32Array;
}

/** The clauses of a network: one for each reactant complex and each species that its arrows produce. */
export function siphonClauses(network: StructuralNetwork): SiphonClauses {
  const counted = { clauses: 0, reactants: 0 };
  forEachClause(network, (_, from) => {
    counted.clauses++;
    counted.reactants += network.complexes.offsets[from + 1]! - network.complexes.offsets[from]!;
  });
  const product = new Int32Array(counted.clauses);
  const offsets = new Int32Array(counted.clauses + 1);
  const reactants = new Int32Array(counted.reactants);
  let clause = 0;
  let end = 0;
  forEachClause(network, (species, from) => {
    product[clause++] = species;
    for (let k = network.complexes.offsets[from]!; k < network.complexes.offsets[from + 1]!; k++) {
      reactants[end++] = network.complexes.species[k]!;
    }
    offsets[clause] = end;
  });
  return { speciesCount: network.species.length, count: counted.clauses, product, offsets, reactants };
}

/** Visits each reactant complex with each species that only its products hold, once. */
function forEachClause(
  network: StructuralNetwork,
  visit: (product: number, reactantComplex: number) => void,
): void {
  const { complexes, outgoing } = network;
  const stamp = new Int32Array(network.species.length).fill(-1);
  for (let from = 0; from < complexes.count; from++) {
    for (let j = complexes.offsets[from]!; j < complexes.offsets[from + 1]!; j++) {
      stamp[complexes.species[j]!] = from;
    }
    for (let a = outgoing.offsets[from]!; a < outgoing.offsets[from + 1]!; a++) {
      const to = network.arrows.to[outgoing.arrows[a]!]!;
      for (let k = complexes.offsets[to]!; k < complexes.offsets[to + 1]!; k++) {
        const species = complexes.species[k]!;
        if (stamp[species] === from) continue;
        stamp[species] = from;
        visit(species, from);
      }
    }
  }
}
