import type { StructuralNetwork } from '../network/index.ts';
import { siphonClauses } from './siphon-clauses.ts';
import { SiphonState } from './siphon-search.ts';

/** Limits of the search, in siphons and in elementary steps: counts, so that results repeat. */
export interface SiphonLimits {
  readonly siphons: number;
  readonly steps: number;
}

export const SIPHON_LIMITS: SiphonLimits = { siphons: 10_000, steps: 40_000_000 };

/** Minimal siphons, species ascending, ordered by their species; all of them where `complete`. */
export interface MinimalSiphons {
  readonly siphons: readonly Int32Array[];
  readonly complete: boolean;
}

/**
 * Minimal siphons: non-empty sets Z of species, minimal for inclusion, such that every arrow with a product in Z has a
 * reactant in Z (Angeli, De Leenheer, Sontag 2007; search by branching on unmet clauses, in the manner of Cordone,
 * Ferrarini, Piroddi 2005). The siphons whose first species is i are found while earlier species are excluded, so none
 * is met twice.
 */
export function minimalSiphons(
  network: StructuralNetwork,
  checkpoint: () => void = () => undefined,
  limits: SiphonLimits = SIPHON_LIMITS,
): MinimalSiphons {
  const clauses = siphonClauses(network);
  const state = new SiphonState(clauses);
  const found = new FoundSiphons();
  let complete = true;
  for (let first = 0; first < clauses.speciesCount && complete; first++) {
    if (!state.isOpen(first)) continue;
    complete = searchFrom(first, state, found, limits, checkpoint);
    state.exclude(first);
  }
  return { siphons: found.minimal(), complete };
}

/** An open choice: candidates are tried one after the other, earlier ones excluded. */
interface Choice {
  readonly depth: number;
  readonly candidates: readonly number[];
  next: number;
}

function searchFrom(
  first: number,
  state: SiphonState,
  found: FoundSiphons,
  limits: SiphonLimits,
  checkpoint: () => void,
): boolean {
  const base = state.depth;
  const choices: Choice[] = [{ depth: base, candidates: [first], next: 0 }];
  while (choices.length > 0) {
    if (state.steps > limits.steps || found.count > limits.siphons) {
      state.undo(base);
      return false;
    }
    checkpoint();
    const choice = choices.at(-1)!;
    state.undo(choice.depth);
    if (choice.next === choice.candidates.length) {
      choices.pop();
      continue;
    }
    const candidate = choice.candidates[choice.next]!;
    const possible =
      choice.candidates.slice(0, choice.next).every((earlier) => state.exclude(earlier)) &&
      state.include(candidate);
    choice.next++;
    if (!possible) continue;
    const inside = state.insideSince(base);
    state.steps += inside.length;
    if (found.someWithin(inside, state)) continue;
    const branches = state.branches(inside);
    if (branches === null) found.record(inside);
    else choices.push({ depth: state.depth, candidates: branches, next: 0 });
  }
  state.undo(base);
  return true;
}

/** Recorded siphons by their first species, to tell quickly whether one lies within a set. */
class FoundSiphons {
  readonly #siphons: Int32Array[] = [];
  readonly #byFirst = new Map<number, Int32Array[]>();

  get count(): number {
    return this.#siphons.length;
  }

  someWithin(species: readonly number[], state: SiphonState): boolean {
    return species.some((first) =>
      (this.#byFirst.get(first) ?? []).some((siphon) => {
        state.steps += siphon.length;
        return siphon.every((member) => state.isInside(member));
      }),
    );
  }

  record(species: readonly number[]): void {
    const siphon = Int32Array.from(species).sort();
    this.#siphons.push(siphon);
    const first = siphon[0]!;
    const known = this.#byFirst.get(first);
    if (known) known.push(siphon);
    else this.#byFirst.set(first, [siphon]);
  }

  /** The recorded siphons without those that contain another, in order of their species. */
  minimal(): Int32Array[] {
    const inOrder = [...this.#siphons].sort(compareSets);
    return inOrder.filter((siphon) => {
      const members = new Set(siphon);
      return !siphon.some((first) =>
        (this.#byFirst.get(first) ?? []).some(
          (other) =>
            other !== siphon && other.length < siphon.length && other.every((member) => members.has(member)),
        ),
      );
    });
  }
}

function compareSets(a: Int32Array, b: Int32Array): number {
  const shared = Math.min(a.length, b.length);
  for (let i = 0; i < shared; i++) {
    if (a[i] !== b[i]) return a[i]! - b[i]!;
  }
  return a.length - b.length;
}
