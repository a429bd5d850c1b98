import type { Network } from '@stillroom/shared/network';

/** Compartment of each species; all in the first (0) where the text has one or none. */
export function compartmentOfSpecies(network: Network): Int32Array {
  const of = new Int32Array(network.species.length);
  network.compartments.forEach(({ species }, index) => {
    for (const one of species) of[one] = index;
  });
  return of;
}

/** Whether a reaction over these species goes across compartments, so that its law is an amount per time. */
export function crossesCompartments(compartmentOf: Int32Array, species: readonly number[]): boolean {
  return species.some((one) => compartmentOf[one] !== compartmentOf[species[0]!]);
}

/** The volume of each compartment, with the trial value of a constant of its name where it has one. */
export function compartmentVolumes(network: Network, constants: readonly (number | null)[]): number[] {
  if (network.compartments.length === 0) return [];
  const places = new Map(network.constants.map(({ name }, index) => [name, index]));
  return network.compartments.map(({ name, volume }) => constants[places.get(name) ?? -1] ?? volume.value);
}
