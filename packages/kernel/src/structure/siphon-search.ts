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
  readonly #trail: number[] = [];
  readonly #pending: number[] = [];
  #conflict = false;
  /** Elementary steps so far. */
  steps = 0;

  constructor(clauses: SiphonClauses) {
    this.#clauses = clauses;
    this.#byProduct = groupBy(clauses.product, clauses.speciesCount);
    this.#byReactant = groupReactants(clauses);
    this.#state = new Uint8Array(clauses.speciesCount);
    this.#candidates = new Int32Array(clauses.count);
    this.#met = new Int32Array(clauses.count);
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

  isInside(species: number): boolean {
    return this.#state[species] === INSIDE;
  }

  /** Length of the trail, to come back to with `undo`. */
  get depth(): number {
    return this.#trail.length;
  }

  /** Species put inside since the trail had the given length, in that order. */
  insideSince(depth: number): number[] {
    return this.#trail.slice(depth).filter((species) => this.#state[species] === INSIDE);
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
    this.#conflict = false;
    this.#pending.length = 0;
    while (this.#trail.length > depth) {
      const species = this.#trail.pop()!;
      const counter = this.#state[species] === INSIDE ? this.#met : this.#candidates;
      const change = this.#state[species] === INSIDE ? -1 : 1;
      this.#forReactant(species, (clause) => (counter[clause]! += change));
      this.#state[species] = OPEN;
    }
  }

  /**
   * Open candidates of the unmet clause of the given inside species that has the fewest; null when every clause is met, so
   * that the inside species form a siphon.
   */
  branches(inside: Iterable<number>): number[] | null {
    let chosen = -1;
    for (const species of inside) {
      const { offsets, items } = this.#byProduct;
      for (let k = offsets[species]!; k < offsets[species + 1]!; k++) {
        this.steps++;
        const clause = items[k]!;
        if (this.#met[clause]! > 0) continue;
        if (chosen < 0 || this.#candidates[clause]! < this.#candidates[chosen]!) chosen = clause;
      }
    }
    return chosen < 0 ? null : this.#openReactants(chosen);
  }

  #set(species: number, state: number): void {
    if (this.#state[species] === state) return;
    if (this.#state[species] !== OPEN) {
      this.#conflict = true;
      return;
    }
    this.#state[species] = state;
    this.#trail.push(species);
    this.#pending.push(species);
    // Counters follow at once, so that undoing may stop anywhere.
    const counter = state === INSIDE ? this.#met : this.#candidates;
    const change = state === INSIDE ? 1 : -1;
    this.#forReactant(species, (clause) => (counter[clause]! += change));
  }

  #propagate(): boolean {
    while (this.#pending.length > 0 && !this.#conflict) {
      const species = this.#pending.pop()!;
      if (this.#state[species] === INSIDE) this.#forProduct(species, (clause) => this.#force(clause));
      else this.#forReactant(species, (clause) => this.#force(clause));
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
    this.steps += offsets[clause + 1]! - offsets[clause]!;
    return open;
  }

  #forProduct(species: number, visit: (clause: number) => void): void {
    this.#visit(this.#byProduct, species, visit);
  }

  #forReactant(species: number, visit: (clause: number) => void): void {
    this.#visit(this.#byReactant, species, visit);
  }

  #visit(grouping: Grouping, species: number, visit: (clause: number) => void): void {
    const start = grouping.offsets[species]!;
    const end = grouping.offsets[species + 1]!;
    this.steps += end - start;
    for (let k = start; k < end; k++) visit(grouping.items[k]!);
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
  keys.forEach((key, item) => (items[next[key]!++] = item));
  return { offsets, items };
}

/** Clauses by reactant. */
function groupReactants(clauses: SiphonClauses): Grouping {
  const { offsets, items } = groupBy(clauses.reactants, clauses.speciesCount);
  const clauseOf = new Int32Array(clauses.reactants.length);
  for (let clause = 0; clause < clauses.count; clause++) {
    clauseOf.fill(clause, clauses.offsets[clause]!, clauses.offsets[clause + 1]!);
  }
  return { offsets, items: items.map((position) => clauseOf[position]!) };
}
