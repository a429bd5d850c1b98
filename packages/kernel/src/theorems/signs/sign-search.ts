import type { TheoremContext } from '../context.ts';
import { ANY, NAUGHT, NEGATIVE, POSITIVE, settled } from './domain.ts';
import type { SignSystem } from './sign-system.ts';
import { openDomains, propagate, signSystem } from './sign-system.ts';
import { kernelVector, reactantVector, subspaceVector } from './sign-vectors.ts';

/** Which kinetics a pattern must be possible for: mass action, or any weakly monotonic law. */
export type PatternKind = 'mass action' | 'weakly monotonic';

/**
 * - `found`: σ in the stoichiometric subspace (scaled units) and α in the kernel of N with compatible signs, σ ≠ 0.
 * - `none`: the search was exhaustive and no pattern exists.
 * - `open`: the budget ran out.
 */
export type PatternSearch =
  | { readonly kind: 'found'; readonly change: bigint[]; readonly flux: bigint[]; readonly nodes: number }
  | { readonly kind: 'none'; readonly nodes: number }
  | { readonly kind: 'open'; readonly nodes: number };

/** Nodes of the search tree times species times arrows that one search may spend; each node solves linear programmes. */
const WORK = 50_000;
const MOST_NODES = 400;
const FEWEST_NODES = 10;

/**
 * Searches a pattern of signs that makes a network discordant (Shinar, Feinberg 2012, definition 4.1) or, for mass
 * action, not injective (Müller et al. 2016, theorem 1.4: sgn(ker N) meets sgn(B(Σ(S)))). Signs are propagated through
 * the equations, open ones branched on, and every node is confirmed or cut by exact linear programmes.
 */
export function searchPattern(context: TheoremContext, kind: PatternKind): PatternSearch {
  if (context.species.length * context.arrows.length * FEWEST_NODES > WORK) return { kind: 'open', nodes: 0 };
  const system = signSystem(context);
  const state: SearchState = { context, system, kind, nodes: 0, most: affordableNodes(system), open: false };
  const domains = openDomains(system);
  propagate(system, domains, [...domains.keys()]);
  for (let lead = 0; lead < system.species; lead++) {
    const start = domains.slice();
    start[lead] = POSITIVE;
    const found = propagate(system, start, [lead]) ? visit(state, start) : null;
    if (found !== null) return { kind: 'found', ...found, nodes: state.nodes };
    if (state.open) return { kind: 'open', nodes: state.nodes };
    // With all earlier species at 0 and, by symmetry, this one not negative, it is 0 from here on.
    domains[lead] = NAUGHT;
    if (!propagate(system, domains, [lead])) break;
  }
  return { kind: 'none', nodes: state.nodes };
}

function affordableNodes({ species, arrows }: SignSystem): number {
  return Math.min(MOST_NODES, Math.floor(WORK / Math.max(1, species * arrows)));
}

interface SearchState {
  readonly context: TheoremContext;
  readonly system: SignSystem;
  readonly kind: PatternKind;
  nodes: number;
  readonly most: number;
  open: boolean;
}

interface Pattern {
  readonly change: bigint[];
  readonly flux: bigint[];
}

function visit(state: SearchState, domains: Uint8Array): Pattern | null {
  const { context, system } = state;
  if (++state.nodes > state.most) {
    state.open = true;
    return null;
  }
  const species = domains.subarray(0, system.species);
  const fluxes = domains.subarray(system.species);
  const change = subspaceVector(context, species);
  if (change === null) return null;
  const flux = kernelVector(context, fluxes);
  if (flux === null) return null;
  const sums = state.kind === 'mass action' ? reactantVector(context, species, fluxes) : [];
  if (sums === null) return null;
  if (change === 'unfinished' || flux === 'unfinished' || sums === 'unfinished') {
    state.open = true;
    return null;
  }
  const branch = nextUnknown(state, domains);
  if (branch < 0) return { change, flux };
  for (const sign of [NAUGHT, POSITIVE, NEGATIVE]) {
    if ((domains[branch]! & sign) === 0) continue;
    const next = domains.slice();
    next[branch] = sign;
    const found = propagate(system, next, [branch]) ? visit(state, next) : null;
    if (found !== null || state.open) return found;
  }
  return null;
}

/** An open species, best one that a settled flux already looks at; then, for mass action, an open flux; or −1. */
function nextUnknown({ system, kind }: SearchState, domains: Uint8Array): number {
  let chosen = -1;
  let most = -1;
  for (let i = 0; i < system.species; i++) {
    if (settled(domains[i]!)) continue;
    const weight = (domains[i] === ANY ? 0 : 1000) + system.uses[i]!.length;
    if (weight > most) {
      most = weight;
      chosen = i;
    }
  }
  if (chosen >= 0 || kind === 'weakly monotonic') return chosen;
  for (let unknown = system.species; unknown < domains.length; unknown++)
    if (!settled(domains[unknown]!)) return unknown;
  return -1;
}
