import { lcm } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';

/** A species in a complex with its coefficient as written. */
export interface Term {
  readonly species: number;
  readonly coefficient: number;
}

/**
 * The complexes of a network as lists of terms. `scaled` measures each species in the unit 1/`scale` that makes all of
 * its coefficients integers, for exact linear algebra; scales are 1 unless a coefficient is a fraction.
 */
export class Coefficients {
  readonly scale: readonly bigint[];
  readonly #terms: readonly (readonly Term[])[];
  readonly #scaled: readonly ReadonlyMap<number, bigint>[];

  constructor({ species, complexes }: StructuralNetwork) {
    const { count, offsets, numerators, denominators } = complexes;
    const scale = species.map(() => 1n);
    for (let k = 0; denominators !== null && k < numerators.length; k++) {
      const i = complexes.species[k]!;
      scale[i] = lcm(scale[i]!, BigInt(denominators[k]!));
    }
    this.scale = scale;
    const terms: Term[][] = [];
    const scaled: Map<number, bigint>[] = [];
    for (let complex = 0; complex < count; complex++) {
      const list: Term[] = [];
      const integers = new Map<number, bigint>();
      for (let k = offsets[complex]!; k < offsets[complex + 1]!; k++) {
        const i = complexes.species[k]!;
        const denominator = denominators?.[k] ?? 1;
        list.push({ species: i, coefficient: numerators[k]! / denominator });
        integers.set(i, (BigInt(numerators[k]!) * scale[i]!) / BigInt(denominator));
      }
      terms.push(list);
      scaled.push(integers);
    }
    this.#terms = terms;
    this.#scaled = scaled;
  }

  terms(complex: number): readonly Term[] {
    return this.#terms[complex]!;
  }

  scaled(complex: number, species: number): bigint {
    return this.#scaled[complex]!.get(species) ?? 0n;
  }

  /** Product complex minus reactant complex in scaled units, by species; entries that cancel are absent. */
  change(from: number, to: number): Map<number, bigint> {
    const change = new Map(this.#scaled[to]!);
    for (const [species, amount] of this.#scaled[from]!) {
      const difference = (change.get(species) ?? 0n) - amount;
      if (difference === 0n) change.delete(species);
      else change.set(species, difference);
    }
    return change;
  }

  /** A linear function given on scaled amounts, as coefficients of the amounts themselves. */
  unscale(law: readonly bigint[]): bigint[] {
    return law.map((weight, i) => weight * this.scale[i]!);
  }
}
