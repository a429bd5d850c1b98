import type { TheoremContext } from '../context.ts';

/** Two directly joined complexes of a terminal strong class; `net` is the flow y → y' at a positive steady state. */
export interface TerminalPair {
  readonly from: number;
  readonly to: number;
  /** Σ g over the side of `to` when the pair is cut, in units of the (positive) factor of g. */
  readonly net: bigint;
}

/** A terminal strong class of a regular network: its complexes and the tree of pairs that joins them. */
export interface TerminalClass {
  readonly complexes: readonly number[];
  readonly pairs: readonly TerminalPair[];
}

/** What the deficiency one algorithm works on: g spans ker Y ∩ im I_a, with the sign a positive steady state has. */
export interface RegularNetwork {
  readonly g: readonly bigint[];
  readonly classes: readonly TerminalClass[];
  /** Whether every complex is terminal, so that −g has to be tried as well. */
  readonly allTerminal: boolean;
}

/**
 * The data of the algorithm for a regular network of deficiency one, or the reason, as a sentence, why it does not apply.
 * Regular: consistent, one terminal strong class per linkage class, and cutting two directly joined complexes of a
 * terminal class separates them (Feinberg 1988, 1995).
 */
export function regularNetwork(context: TheoremContext): RegularNetwork | string {
  if (context.deficiency !== 1) return 'The deficiency is not 1.';
  if (context.kinetics.otherLaw !== null || context.kinetics.interventions !== null)
    return 'Not all rates are mass action.';
  if (context.consistency?.holds !== true) return 'The network is not known to be consistent.';
  const vector = context.deficiencyVectors?.[0];
  if (vector === undefined) return 'The network is too large.';
  if (context.linkageClasses.some(({ terminalStrongClasses }) => terminalStrongClasses.length > 1)) {
    return 'A linkage class has several terminal strong classes.';
  }
  const allTerminal = context.nonterminalComplexes.length === 0;
  const g = allTerminal ? vector : oriented(context, vector);
  const classes: TerminalClass[] = [];
  for (const { terminalStrongClasses } of context.linkageClasses) {
    const complexes = terminalStrongClasses[0]!;
    const pairs = pairsOf(context, complexes, g);
    if (pairs === null)
      return 'Cutting two joined complexes of a terminal strong class does not separate them.';
    classes.push({ complexes, pairs });
  }
  return { g, classes, allTerminal };
}

/** The sign of g for which the net flow runs into terminal classes. */
function oriented(context: TheoremContext, g: readonly bigint[]): bigint[] {
  const inflows = context.linkageClasses.map(({ terminalStrongClasses }) =>
    terminalStrongClasses[0]!.reduce((sum, complex) => sum + g[complex]!, 0n),
  );
  return inflows.some((inflow) => inflow < 0n) ? g.map((value) => -value) : [...g];
}

function pairsOf(
  context: TheoremContext,
  complexes: readonly number[],
  g: readonly bigint[],
): TerminalPair[] | null {
  const members = new Set(complexes);
  const seen = new Set<string>();
  const pairs: TerminalPair[] = [];
  for (const { from, to } of context.arrows) {
    if (!members.has(from) || !members.has(to)) continue;
    const key = from < to ? `${from} ${to}` : `${to} ${from}`;
    if (seen.has(key)) continue;
    seen.add(key);
    const side = sideOf(context, from, to);
    if (side.has(from)) return null;
    pairs.push({ from, to, net: [...side].reduce((sum, complex) => sum + g[complex]!, 0n) });
  }
  return pairs;
}

/** Complexes still connected with `to` when all arrows between `from` and `to` are deleted. */
function sideOf(context: TheoremContext, from: number, to: number): Set<number> {
  const joined = context.memo('joined complexes', () => {
    const lists: number[][] = Array.from({ length: context.complexCount }, () => []);
    for (const arrow of context.arrows) {
      lists[arrow.from]!.push(arrow.to);
      lists[arrow.to]!.push(arrow.from);
    }
    return lists;
  });
  const side = new Set([to]);
  for (const complex of side) {
    for (const other of joined[complex]!) {
      if (complex === to && other === from) continue;
      side.add(other);
    }
  }
  return side;
}
