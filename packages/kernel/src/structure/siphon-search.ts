import type { SiphonClauses } from './siphon-clauses.ts';

const OPEN = 0;
const INSIDE = 1;
const OUTSIDE = 2;

/**
 * The state of a search for siphons: species inside Z, outside, or open, with all consequences drawn. Invariant: the
 * species that are not outside form the greatest siphon that avoids the excluded ones, and every clause of an inside
 * species with a single candidate has that candidate inside. Each change is on a trail and can be taken back.
 */
export class SiphonState {
  readonly #clauses: SiphonClauses;
  readonly #byProduct: Grouping;
  readonly #byReactant: Grouping;
  readonly #state: Uint8Array;
  /** Per clause: reactants that are not outside, and reactants that are inside. */
  readonly #candidates: Int32Array;
  readonly #met: Int32Array;
  readonly #trail: Int32Array;
  #trailEnd = 0;
  readonly #pending: Int32Array;
  #pendingEnd = 0;
  #conflict = false;
  /** For tests of subsets: rounds in which a species was taken out, and how many met reactants a clause has left. */
  readonly #removedIn: Int32Array;
  readonly #countedIn: Int32Array;
  readonly #left: Int32Array;
  #round = 0;
  /** Elementary steps so far. */
  steps = 0;

  constructor(clauses: SiphonClauses) {
    this.#clauses = clauses;
    this.#byProduct = groupBy(clauses.product, clauses.speciesCount);
    this.#byReactant = groupReactants(clauses);
    this.#state = new Uint8Array(clauses.speciesCount);
    this.#trail = new Int32Array(clauses.speciesCount);
    this.#pending = new Int32Array(clauses.speciesCount);
    this.#removedIn = new Int32Array(clauses.speciesCount);
    this.#candidates = new Int32Array(clauses.count);
    this.#met = new Int32Array(clauses.count);
    this.#countedIn = new Int32Array(clauses.count);
    this.#left = new Int32Array(clauses.count);
    for (let clause = 0; clause < clauses.count; clause++) {
      this.#candidates[clause] = clauses.offsets[clause + 1]! - clauses.offsets[clause]!;
    }
    for (let clause = 0; clause < clauses.count; clause++) {
      if (this.#candidates[clause] === 0) this.exclude(clauses.product[clause]!);
    }
  }

  isOpen(species: number): boolean {
    return this.#state[species] === OPEN;
  }

  /** Length of the trail, to come back to with `undo`. */
  get depth(): number {
    return this.#trailEnd;
  }

  /** Species put inside since the trail had the given length, in that order. */
  insideSince(depth: number): Int32Array {
    this.steps += this.#trailEnd - depth;
    return this.#trail.subarray(depth, this.#trailEnd).filter((species) => this.#state[species] === INSIDE);
  }

  /** Puts a species inside and draws consequences; false when that is impossible. */
  include(species: number): boolean {
    this.#set(species, INSIDE);
    return this.#propagate();
  }

  /** Puts a species outside and draws consequences; false when that is impossible. */
  exclude(species: number): boolean {
    this.#set(species, OUTSIDE);
    return this.#propagate();
  }

  /** Takes back every change since the trail had the given length. */
  undo(depth: number): void {
    const { offsets, items } = this.#byReactant;
    this.#conflict = false;
    this.#pendingEnd = 0;
    while (this.#trailEnd > depth) {
      const species = this.#trail[--this.#trailEnd]!;
      const inside = this.#state[species] === INSIDE;
      for (let k = offsets[species]!; k < offsets[species + 1]!; k++) {
        if (inside) this.#met[items[k]!]!--;
        else this.#candidates[items[k]!]!++;
      }
      this.#state[species] = OPEN;
    }
  }

  /**
   * Size of the greatest siphon within the inside species, `without` taken out of them (or nothing): species with an
   * unmet clause fall out, and what depended on them.
   */
  greatestWithin(inside: Int32Array, without: number | null): number {
    const round = ++this.#round;
    let size = inside.length;
    const fallen: number[] = [];
    const fall = (species: number) => {
      this.#removedIn[species] = round;
      fallen.push(species);
      size--;
    };
    if (without !== null) fall(without);
    for (const species of inside) {
      if (this.#removedIn[species] !== round && this.#hasUnmetClause(species)) fall(species);
    }
    const { offsets, items } = this.#byReactant;
    for (let species = fallen.pop(); species !== undefined; species = fallen.pop()) {
      this.steps += offsets[species + 1]! - offsets[species]!;
      for (let k = offsets[species]!; k < offsets[species + 1]!; k++) {
        const clause = items[k]!;
        const product = this.#clauses.product[clause]!;
        if (this.#state[product] !== INSIDE || this.#removedIn[product] === round) continue;
        if (this.#countedIn[clause] !== round) {
          this.#countedIn[clause] = round;
          this.#left[clause] = this.#met[clause]!;
        }
        if (--this.#left[clause]! === 0) fall(product);
      }
    }
    return size;
  }

  /** Open candidates of the unmet clause of an inside species that has the fewest; some clause must be unmet. */
  branches(inside: Int32Array): number[] {
    const { offsets, items } = this.#byProduct;
    let chosen = -1;
    for (const species of inside) {
      this.steps += offsets[species + 1]! - offsets[species]!;
      for (let k = offsets[species]!; k < offsets[species + 1]!; k++) {
        const clause = items[k]!;
        if (this.#met[clause]! > 0) continue;
        if (chosen < 0 || this.#candidates[clause]! < this.#candidates[chosen]!) chosen = clause;
      }
    }
    return this.#openReactants(chosen);
  }

  #hasUnmetClause(species: number): boolean {
    const { offsets, items } = this.#byProduct;
    for (let k = offsets[species]!; k < offsets[species + 1]!; k++) {
      this.steps++;
      if (this.#met[items[k]!] === 0) return true;
    }
    return false;
  }

  #set(species: number, state: number): void {
    if (this.#state[species] === state) return;
    if (this.#state[species] !== OPEN) {
      this.#conflict = true;
      return;
    }
    this.#state[species] = state;
    this.#trail[this.#trailEnd++] = species;
    this.#pending[this.#pendingEnd++] = species;
    // Counters follow at once, so that undoing may begin anywhere.
    const { offsets, items } = this.#byReactant;
    this.steps += offsets[species + 1]! - offsets[species]!;
    for (let k = offsets[species]!; k < offsets[species + 1]!; k++) {
      if (state === INSIDE) this.#met[items[k]!]!++;
      else this.#candidates[items[k]!]!--;
    }
  }

  #propagate(): boolean {
    while (this.#pendingEnd > 0 && !this.#conflict) {
      const species = this.#pending[--this.#pendingEnd]!;
      const { offsets, items } = this.#state[species] === INSIDE ? this.#byProduct : this.#byReactant;
      this.steps += offsets[species + 1]! - offsets[species]!;
      for (let k = offsets[species]!; k < offsets[species + 1]!; k++) this.#force(items[k]!);
    }
    return !this.#conflict;
  }

  /** Without candidate the product goes outside; with one candidate an inside product takes it inside. */
  #force(clause: number): void {
    const product = this.#clauses.product[clause]!;
    if (this.#candidates[clause] === 0) {
      if (this.#state[product] !== OUTSIDE) this.#set(product, OUTSIDE);
    } else if (this.#candidates[clause] === 1 && this.#met[clause] === 0 && this.#state[product] === INSIDE) {
      this.#set(this.#openReactants(clause)[0]!, INSIDE);
    }
  }

  #openReactants(clause: number): number[] {
    const { offsets, reactants } = this.#clauses;
    const open: number[] = [];
    for (let k = offsets[clause]!; k < offsets[clause + 1]!; k++) {
      if (this.#state[reactants[k]!] === OPEN) open.push(reactants[k]!);
    }
    return open;
  }
}

interface Grouping {
  readonly offsets: Int32Array;
  readonly items: Int32Array;
}

function groupBy(keys: Int32Array, count: number): Grouping {
  const offsets = new Int32Array(count + 1);
  for (const key of keys) offsets[key + 1]!++;
  for (let key = 0; key < count; key++) offsets[key + 1]! += offsets[key]!;
  const next = offsets.slice(0, count);
  const items = new Int32Array(keys.length);
  for (let item = 0; item < keys.length; item++) items[next[keys[item]!]!++] = item;
  return { offsets, items };
}

/** Clauses by reactant. */
function groupReactants(clauses: SiphonClauses): Grouping {
  const { offsets, items } = groupBy(clauses.reactants, clauses.speciesCount);
  const clauseOf = new Int32Array(clauses.reactants.length);
  for (let clause = 0; clause < clauses.count; clause++) {
    clauseOf.fill(clause, clauses.offsets[clause]!, clauses.offsets[clause + 1]!);
  }
  for (let k = 0; k < items.length; k++) items[k] = clauseOf[items[k]!]!;
  return { offsets, items };
}
