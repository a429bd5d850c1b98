import type { TheoremContext } from '../context.ts';

/** States that one search may visit, and molecules it lets exist at once. */
const MOST_STATES = 3_000;
const MOST_MOLECULES = 6;

/**
 * Whether every state of the counts is reachable from every other, shown in one way only: from no molecules at all each
 * single molecule can arise, and from each single molecule all can vanish. Further molecules never stop a reaction, so
 * that suffices. False says only that a bounded search did not show it.
 */
export function wholeLattice(context: TheoremContext): boolean {
  if (!context.whole || context.species.length > 40 || context.arrows.length > 200) return false;
  if (context.conservation?.holds === true) return false;
  const forward = context.arrows.map(({ from, to }) => [context.terms(from), context.terms(to)] as const);
  const backward = context.arrows.map(({ from, to }) => [context.terms(to), context.terms(from)] as const);
  return [forward, backward].every((moves) => reachesSingles(context, moves));
}

type Move = readonly [TermList, TermList];
type TermList = readonly { readonly species: number; readonly coefficient: number }[];

/** Whether each single molecule is reached from the empty state by the moves given. */
function reachesSingles(context: TheoremContext, moves: readonly Move[]): boolean {
  const size = context.species.length;
  const empty = new Array<number>(size).fill(0);
  const seen = new Set([empty.join()]);
  const wanted = new Set(context.species.map((_, i) => empty.map((_unused, k) => (k === i ? 1 : 0)).join()));
  const queue: number[][] = [empty];
  for (const state of queue) {
    for (const [taken, made] of moves) {
      if (taken.some(({ species, coefficient }) => state[species]! < coefficient)) continue;
      const next = [...state];
      for (const { species, coefficient } of taken) next[species]! -= coefficient;
      for (const { species, coefficient } of made) next[species]! += coefficient;
      if (next.reduce((sum, count) => sum + count, 0) > MOST_MOLECULES) continue;
      const key = next.join();
      if (seen.has(key)) continue;
      seen.add(key);
      wanted.delete(key);
      if (wanted.size === 0) return true;
      if (seen.size > MOST_STATES) return false;
      queue.push(next);
    }
  }
  return wanted.size === 0;
}
