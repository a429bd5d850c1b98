import type { Network } from '@stillroom/shared/network';
import { leftKernel } from '../exact/index.ts';
import { stoichiometry, structuralNetwork } from '../network/index.ts';
import { compartmentOfSpecies, type RateEquations } from '../rates/index.ts';

/** A conservation law: coefficients by name of species. */
export type Law = Readonly<Record<string, number>>;

/** Beyond so many species the laws are not sought for the sake of a course. */
const mostSpecies = 2000;

/**
 * A basis of the conservation laws of the species that react; empty where there is none or the network is too large.
 * Several compartments: the laws are of amounts, so coefficients are multiplied by
 * their `volumes`.
 */
export function conservationLawsOf(
  network: Network,
  volumes: readonly number[],
  checkpoint?: () => void,
): Law[] {
  if (network.species.length > mostSpecies) return [];
  const structural = structuralNetwork(network);
  const compartmentOf = compartmentOfSpecies(network);
  const volume = (species: number): number => (volumes.length > 1 ? volumes[compartmentOf[species]!]! : 1);
  const basis = leftKernel(stoichiometry(structural).matrix, checkpoint)?.basis ?? [];
  return basis.map(({ indices, values }) => {
    const entries = values.map((value, n) => {
      const species = structural.sourceSpecies[indices[n]!]!;
      return [network.species[species]!, Number(value) * volume(species)];
    });
    return Object.fromEntries(entries) as Law;
  });
}

/** Measures how far conservation laws depart from their totals along a course. Fixed species do not count. */
export class ConservationWatch {
  private readonly laws: readonly { readonly variables: Int32Array; readonly coefficients: Float64Array }[];
  private readonly totals: Float64Array;
  private largest = 0;

  constructor(laws: readonly Law[], network: Network, equations: RateEquations, start: Float64Array) {
    const places = new Map(network.species.map((name, species) => [name, equations.variableOf[species]!]));
    this.laws = laws.map((law) => {
      const entries = Object.entries(law).filter(([name]) => (places.get(name) ?? -1) >= 0);
      return {
        variables: Int32Array.from(entries, ([name]) => places.get(name)!),
        coefficients: Float64Array.from(entries, ([, coefficient]) => coefficient),
      };
    });
    this.totals = new Float64Array(laws.length);
    this.observe(start, true);
  }

  /** Compares the totals with those at the start, or takes them anew after an event. */
  observe(state: Float64Array, anew: boolean): void {
    this.laws.forEach(({ variables, coefficients }, law) => {
      let total = 0;
      let size = 0;
      for (let n = 0; n < variables.length; n++) {
        const part = coefficients[n]! * state[variables[n]!]!;
        total += part;
        size += Math.abs(part);
      }
      if (anew) this.totals[law] = total;
      else if (size > 0) this.largest = Math.max(this.largest, Math.abs(total - this.totals[law]!) / size);
    });
  }

  /** The largest relative departure; null without laws. */
  get drift(): number | null {
    return this.laws.length === 0 ? null : this.largest;
  }
}
