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
  const { complexes, outgoing } = network;
  const product: number[] = [];
  const offsets: number[] = [0];
  const reactants: number[] = [];
  // One clause per reactant complex and product, whatever the arrow.
  const stamp = new Int32Array(network.species.length).fill(-1);
  for (let from = 0; from < complexes.count; from++) {
    const start = complexes.offsets[from]!;
    const end = complexes.offsets[from + 1]!;
    for (let j = start; j < end; j++) stamp[complexes.species[j]!] = from;
    for (let a = outgoing.offsets[from]!; a < outgoing.offsets[from + 1]!; a++) {
      const to = network.arrows.to[outgoing.arrows[a]!]!;
      for (let k = complexes.offsets[to]!; k < complexes.offsets[to + 1]!; k++) {
        const species = complexes.species[k]!;
        if (stamp[species] === from) continue;
        stamp[species] = from;
        product.push(species);
        for (let j = start; j < end; j++) reactants.push(complexes.species[j]!);
        offsets.push(reactants.length);
      }
    }
  }
  return {
    speciesCount: network.species.length,
    count: product.length,
    product: Int32Array.from(product),
    offsets: Int32Array.from(offsets),
    reactants: Int32Array.from(reactants),
  };
}
