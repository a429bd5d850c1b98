import type { Rational } from '../../exact/index.ts';
import {
  add,
  divide,
  formatRational,
  isZero,
  multiply,
  ONE,
  power,
  rational,
  ZERO,
} from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';

/** A polynomial in the group variables: coefficient by monomial key. */
type Reduced = ReadonlyMap<string, Rational>;

/**
 * The coarsest way to bind species together that the rate equations respect from a given start: species of a group stay in
 * the proportions of the start, x_i = a_i u_g for ever, because their equations divided by a_i agree as polynomials.
 * Species that start at zero and have no source stay there. Found by splitting groups until nothing changes.
 */
export class ProportionalSpecies {
  readonly #context: TheoremContext;
  readonly #constants: readonly Rational[];
  readonly #weights: readonly Rational[];
  /** Group of each species; −1 stays at zero. */
  #group: number[];

  constructor(context: TheoremContext, constants: readonly Rational[], start: readonly Rational[]) {
    this.#context = context;
    this.#constants = constants;
    this.#weights = start.map((amount) => (isZero(amount) ? ONE : amount));
    this.#group = start.map((amount) => (isZero(amount) ? -1 : 0));
    for (;;) {
      const next = this.#split();
      if (next.every((group, i) => group === this.#group[i])) break;
      this.#group = next;
    }
  }

  /** Whether inflow minus outflow of a complex vanishes on the whole set of states so bound. */
  balances(complex: number): boolean {
    const sum = new Map<string, Rational>();
    this.#context.arrows.forEach(({ from, to }, arrow) => {
      const sense = to === complex ? ONE : from === complex ? rational(-1n) : null;
      if (sense !== null) this.#addTerm(sum, from, multiply(sense, this.#constants[arrow]!));
    });
    return [...sum.values()].every(isZero);
  }

  #split(): number[] {
    const slopes = this.#context.species.map((): Map<string, Rational> => new Map());
    this.#context.arrows.forEach(({ from, to }, arrow) => {
      for (const [i, amount] of this.#context.coefficients.change(from, to)) {
        this.#addTerm(slopes[i]!, from, multiply(rational(amount), this.#constants[arrow]!));
      }
    });
    const known = new Map<string, number>();
    return slopes.map((slope, i) => {
      const key = `${this.#group[i]}|${keyOf(slope, this.#weights[i]!)}`;
      // What starts at zero stays there while nothing produces it; otherwise it goes its own way.
      if (this.#group[i] === -1 && [...slope.values()].every(isZero)) return -1;
      const own = this.#group[i] === -1 ? `${i}|alone` : key;
      if (!known.has(own)) known.set(own, known.size);
      return known.get(own)!;
    });
  }

  /** Adds factor · x^y written in group variables; a species that stays at zero makes it vanish. */
  #addTerm(sum: Map<string, Rational>, complex: number, factor: Rational): void {
    const exponents = new Map<number, number>();
    let value = factor;
    for (const { species, coefficient } of this.#context.terms(complex)) {
      const group = this.#group[species]!;
      if (group === -1) return;
      exponents.set(group, (exponents.get(group) ?? 0) + coefficient);
      value = multiply(value, power(this.#weights[species]!, coefficient));
    }
    const key = [...exponents]
      .sort(([a], [b]) => a - b)
      .map(([group, exponent]) => `${group}^${exponent}`)
      .join('*');
    sum.set(key, add(sum.get(key) ?? ZERO, value));
  }
}

function keyOf(slope: Reduced, weight: Rational): string {
  return [...slope]
    .filter(([, value]) => !isZero(value))
    .map(([key, value]) => `${key}=${formatRational(divide(value, weight))}`)
    .sort()
    .join(';');
}
