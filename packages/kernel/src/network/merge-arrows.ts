import type { Adjacency } from './adjacency.ts';
import { adjacencyBy } from './adjacency.ts';

/** Written reactions between complexes of the structural network. */
export interface WrittenReactions {
  readonly count: number;
  /** Index of each in `source.reactions`. */
  readonly source: Int32Array;
  readonly from: Int32Array;
  readonly to: Int32Array;
}

/** Written reactions with the arrow that each of them states. */
export interface KeptReactions extends WrittenReactions {
  readonly arrow: Int32Array;
}

/** Distinct directed arrows. */
export interface ArrowTable {
  readonly count: number;
  readonly from: Int32Array;
  readonly to: Int32Array;
  /** The arrow in the opposite sense, or -1. */
  readonly reverse: Int32Array;
  /** The first written reaction (index into the kept reactions) that states it. */
  readonly reaction: Int32Array;
}

/** Distinct arrows, the reactions that state them, and the arrows by complex. */
export interface MergedArrows {
  readonly arrows: ArrowTable;
  readonly reactions: KeptReactions;
  readonly outgoing: Adjacency;
  readonly incoming: Adjacency;
}

/**
 * Merges reactions with equal sides into distinct arrows, in order of first writing, and pairs opposite arrows. Linear:
 * reactions are grouped by reactant complex and a stamp per complex finds repeats.
 */
export function mergeArrows(reactions: WrittenReactions, complexCount: number): MergedArrows {
  const grouped = adjacencyBy(reactions.from, complexCount);
  const firstOf = firstEqual(reactions, grouped, complexCount);
  const arrow = new Int32Array(reactions.count);
  const first = new Int32Array(reactions.count);
  let count = 0;
  for (let reaction = 0; reaction < reactions.count; reaction++) {
    if (firstOf[reaction] === reaction) {
      first[count] = reaction;
      arrow[reaction] = count++;
    } else {
      arrow[reaction] = arrow[firstOf[reaction]!]!;
    }
  }
  const merged = count < reactions.count;
  const pick = (ends: Int32Array) =>
    merged ? Int32Array.from({ length: count }, (_, index) => ends[first[index]!]!) : ends;
  const from = pick(reactions.from);
  const to = pick(reactions.to);
  const outgoing = merged ? adjacencyBy(from, complexCount) : grouped;
  const incoming = adjacencyBy(to, complexCount);
  const reverse = oppositeArrows(from, to, outgoing, incoming);
  return {
    arrows: { count, from, to, reverse, reaction: first.subarray(0, count) },
    reactions: { ...reactions, arrow },
    outgoing,
    incoming,
  };
}

/** For each reaction the first one with the same sides. */
function firstEqual(reactions: WrittenReactions, grouped: Adjacency, complexCount: number): Int32Array {
  const { offsets, arrows } = grouped;
  const stamp = new Int32Array(complexCount).fill(-1);
  const seen = new Int32Array(complexCount);
  const firstOf = new Int32Array(reactions.count);
  for (let complex = 0; complex < complexCount; complex++) {
    for (let k = offsets[complex]!; k < offsets[complex + 1]!; k++) {
      const reaction = arrows[k]!;
      const target = reactions.to[reaction]!;
      if (stamp[target] !== complex) {
        stamp[target] = complex;
        seen[target] = reaction;
      }
      firstOf[reaction] = seen[target]!;
    }
  }
  return firstOf;
}

function oppositeArrows(
  from: Int32Array,
  to: Int32Array,
  outgoing: Adjacency,
  incoming: Adjacency,
): Int32Array {
  const complexCount = outgoing.offsets.length - 1;
  const stamp = new Int32Array(complexCount).fill(-1);
  const leaving = new Int32Array(complexCount);
  const reverse = new Int32Array(from.length).fill(-1);
  for (let complex = 0; complex < complexCount; complex++) {
    for (let k = outgoing.offsets[complex]!; k < outgoing.offsets[complex + 1]!; k++) {
      const arrow = outgoing.arrows[k]!;
      stamp[to[arrow]!] = complex;
      leaving[to[arrow]!] = arrow;
    }
    for (let k = incoming.offsets[complex]!; k < incoming.offsets[complex + 1]!; k++) {
      const arrow = incoming.arrows[k]!;
      if (stamp[from[arrow]!] === complex) reverse[arrow] = leaving[from[arrow]!]!;
    }
  }
  return reverse;
}
