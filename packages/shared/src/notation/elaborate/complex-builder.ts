import type { ComplexTable } from '../../network/network.ts';
import type { TermSyntax } from '../ast.ts';
import { sumOfCoefficients } from '../coefficients.ts';
import { finish, GrowingInts, GrowingNumbers, mix } from './growing.ts';

/**
 * Numbers complexes in the order in which they come. Terms are handed over one by one; equal species are added up and
 * species stand in ascending order, so that equal complexes get the same number.
 */
export class ComplexBuilder {
  private readonly offsets = new GrowingInts();
  private readonly species = new GrowingInts();
  private readonly numerators = new GrowingNumbers();
  /** Made with the first coefficient that is no integer. */
  private denominators: GrowingNumbers | null = null;
  /** Number of the complex that is one molecule of a species, -1 where it has not come: the common case without a hash. */
  private readonly single = new GrowingInts();
  private slots = new Int32Array(1024);
  private hashed = 0;

  /** The complex being put together. */
  private size = 0;
  private readonly nextSpecies: number[] = [];
  private readonly nextNumerators: number[] = [];
  private readonly nextDenominators: number[] = [];

  constructor() {
    this.offsets.push(0);
  }

  get count(): number {
    return this.offsets.length - 1;
  }

  /** Adds a term. Throws Failure where the coefficients of a species add up to more than 2^53. */
  add(species: number, term: TermSyntax): void {
    let place = this.size;
    while (place > 0 && (this.nextSpecies[place - 1] as number) >= species) place -= 1;
    if (place < this.size && this.nextSpecies[place] === species) {
      const before = {
        numerator: this.nextNumerators[place] as number,
        denominator: this.nextDenominators[place] as number,
      };
      const sum = sumOfCoefficients(before, term);
      this.nextNumerators[place] = sum.numerator;
      this.nextDenominators[place] = sum.denominator;
      return;
    }
    for (let i = this.size; i > place; i -= 1) {
      this.nextSpecies[i] = this.nextSpecies[i - 1] as number;
      this.nextNumerators[i] = this.nextNumerators[i - 1] as number;
      this.nextDenominators[i] = this.nextDenominators[i - 1] as number;
    }
    this.nextSpecies[place] = species;
    this.nextNumerators[place] = term.numerator;
    this.nextDenominators[place] = term.denominator;
    this.size += 1;
  }

  /** The number of the complex of the terms added since the last call, which is given one where it has none. */
  finish(): number {
    const number = this.isSingle() ? this.internSingle(this.nextSpecies[0] as number) : this.internHashed();
    this.size = 0;
    return number;
  }

  /** Forgets the terms added since the last call of `finish`. */
  drop(): void {
    this.size = 0;
  }

  /** Whether a species occurs in a complex; looks at all of them. */
  uses(species: number): boolean {
    for (let i = 0; i < this.species.length; i += 1) if (this.species.get(i) === species) return true;
    return false;
  }

  /** The species of a complex with their coefficients as doubles. */
  termsOf(number: number): { species: number; coefficient: number }[] {
    const terms: { species: number; coefficient: number }[] = [];
    for (let i = this.offsets.get(number); i < this.offsets.get(number + 1); i += 1) {
      const coefficient = this.numerators.get(i) / (this.denominators?.get(i) ?? 1);
      terms.push({ species: this.species.get(i), coefficient });
    }
    return terms;
  }

  toTable(): ComplexTable {
    return {
      count: this.count,
      offsets: this.offsets.toArray(),
      species: this.species.toArray(),
      numerators: this.numerators.toArray(),
      denominators: this.denominators?.toArray() ?? null,
    };
  }

  private isSingle(): boolean {
    return this.size === 1 && this.nextNumerators[0] === 1 && this.nextDenominators[0] === 1;
  }

  private internSingle(species: number): number {
    while (this.single.length <= species) this.single.push(-1);
    const known = this.single.get(species);
    if (known >= 0) return known;
    this.single.set(species, this.count);
    return this.append();
  }

  private internHashed(): number {
    if (this.hashed * 2 >= this.slots.length) this.grow();
    const mask = this.slots.length - 1;
    let slot = this.hashOfNext() & mask;
    for (;;) {
      const number = (this.slots[slot] as number) - 1;
      if (number < 0) break;
      if (this.equalsNext(number)) return number;
      slot = (slot + 1) & mask;
    }
    this.slots[slot] = this.count + 1;
    this.hashed += 1;
    return this.append();
  }

  private append(): number {
    for (let i = 0; i < this.size; i += 1) {
      const denominator = this.nextDenominators[i] as number;
      if (denominator !== 1 && !this.denominators) {
        this.denominators = new GrowingNumbers();
        for (let j = 0; j < this.numerators.length; j += 1) this.denominators.push(1);
      }
      this.species.push(this.nextSpecies[i] as number);
      this.numerators.push(this.nextNumerators[i] as number);
      this.denominators?.push(denominator);
    }
    this.offsets.push(this.species.length);
    return this.count - 1;
  }

  private hashOfNext(): number {
    let hash = this.size;
    for (let i = 0; i < this.size; i += 1) {
      hash = mix(hash, this.nextSpecies[i] as number);
      hash = mix(hash, (this.nextNumerators[i] as number) | 0);
      hash = mix(hash, (this.nextDenominators[i] as number) | 0);
    }
    return finish(hash);
  }

  private equalsNext(number: number): boolean {
    const from = this.offsets.get(number);
    if (this.offsets.get(number + 1) - from !== this.size) return false;
    for (let i = 0; i < this.size; i += 1) {
      if (this.species.get(from + i) !== this.nextSpecies[i]) return false;
      if (this.numerators.get(from + i) !== this.nextNumerators[i]) return false;
      if ((this.denominators?.get(from + i) ?? 1) !== this.nextDenominators[i]) return false;
    }
    return true;
  }

  private grow(): void {
    const old = this.slots;
    this.slots = new Int32Array(old.length * 2);
    const mask = this.slots.length - 1;
    for (const entry of old) {
      if (entry === 0) continue;
      let slot = this.hashOf(entry - 1) & mask;
      while (this.slots[slot] !== 0) slot = (slot + 1) & mask;
      this.slots[slot] = entry;
    }
  }

  private hashOf(number: number): number {
    const from = this.offsets.get(number);
    const to = this.offsets.get(number + 1);
    let hash = to - from;
    for (let i = from; i < to; i += 1) {
      hash = mix(hash, this.species.get(i));
      hash = mix(hash, this.numerators.get(i) | 0);
      hash = mix(hash, (this.denominators?.get(i) ?? 1) | 0);
    }
    return finish(hash);
  }
}
