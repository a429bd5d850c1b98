import type { StructuralNetwork } from '../network/index.ts';
import { siphonClauses } from './siphon-clauses.ts';
import { SiphonState } from './siphon-search.ts';

/** Limits of the search, in siphons and in elementary steps: counts, so that results repeat. */
export interface SiphonLimits {
  readonly siphons: number;
  readonly steps: number;
}

export const SIPHON_LIMITS: SiphonLimits = { siphons: 10_000, steps: 60_000_000 };

/** Minimal siphons, species ascending, ordered by their species; all of them where `complete`. */
export interface MinimalSiphons {
  readonly siphons: readonly Int32Array[];
  readonly complete: boolean;
}

/**
 * Minimal siphons: non-empty sets Z of species, minimal for inclusion, such that every arrow with a product in Z has a
 * reactant in Z (Angeli, De Leenheer, Sontag 2007; search by branching on unmet clauses, in the manner of Cordone,
 * Ferrarini, Piroddi 2005). The siphons whose first species is i are found while earlier species are excluded, and of
 * several candidates for a clause each is tried with the earlier ones excluded, so none is met twice.
 */
export function minimalSiphons(
  network: StructuralNetwork,
  checkpoint: () => void = () => undefined,
  limits: SiphonLimits = SIPHON_LIMITS,
): MinimalSiphons {
  const search = new Search(new SiphonState(siphonClauses(network)), limits, checkpoint);
  let complete = true;
  for (let first = 0; first < network.species.length && complete; first++) {
    complete = search.from(first);
  }
  complete &&= search.found.length <= limits.siphons;
  return { siphons: search.found.slice(0, limits.siphons).sort(compareSets), complete };
}

/** An open choice: candidates are tried one after the other, earlier ones excluded. */
interface Choice {
  readonly depth: number;
  readonly candidates: readonly number[];
  next: number;
}

class Search {
  readonly found: Int32Array[] = [];
  readonly #state: SiphonState;
  readonly #limits: SiphonLimits;
  readonly #checkpoint: () => void;

  constructor(state: SiphonState, limits: SiphonLimits, checkpoint: () => void) {
    this.#state = state;
    this.#limits = limits;
    this.#checkpoint = checkpoint;
  }

  /** Finds the minimal siphons with this first species, then excludes it for good; false beyond the limits. */
  from(first: number): boolean {
    const state = this.#state;
    if (!state.isOpen(first)) return true;
    const base = state.depth;
    const choices: Choice[] = [{ depth: base, candidates: [first], next: 0 }];
    for (let choice = choices.at(-1); choice !== undefined; choice = choices.at(-1)) {
      this.#checkpoint();
      if (state.steps > this.#limits.steps || this.found.length > this.#limits.siphons) return false;
      state.undo(choice.depth);
      if (choice.next === choice.candidates.length) {
        choices.pop();
        continue;
      }
      if (!take(state, choice)) continue;
      const inside = state.insideSince(base);
      const siphon = state.greatestWithin(inside, null);
      if (siphon === 0) choices.push({ depth: state.depth, candidates: state.branches(inside), next: 0 });
      else if (siphon === inside.length && this.#minimal(inside, choices)) this.found.push(inside.sort());
    }
    return state.exclude(first);
  }

  /**
   * A siphon inside this one misses one of the species that were chosen: all others follow from those. (Where the inside
   * species hold a smaller siphon the branch is dropped before.)
   */
  #minimal(inside: Int32Array, choices: readonly Choice[]): boolean {
    return choices.every(
      ({ candidates, next }) => this.#state.greatestWithin(inside, candidates[next - 1]!) === 0,
    );
  }
}

/** Puts the next candidate inside and those before it outside; false when that is impossible. */
function take(state: SiphonState, choice: Choice): boolean {
  const candidate = choice.candidates[choice.next++]!;
  for (let k = 0; k < choice.next - 1; k++) {
    if (!state.exclude(choice.candidates[k]!)) return false;
  }
  return state.include(candidate);
}

function compareSets(a: Int32Array, b: Int32Array): number {
  const shared = Math.min(a.length, b.length);
  for (let i = 0; i < shared; i++) {
    if (a[i] !== b[i]) return a[i]! - b[i]!;
  }
  return a.length - b.length;
}
