import type { Rational } from '../exact/index.ts';
import { integerKernel, matrixOfRows, primitiveWithPositiveLead } from '../exact/index.ts';
import type { TheoremContext } from '../theorems/context.ts';
import type { BalanceCondition } from './complex-conditions.ts';
import { powersOf, productIsOne, productText } from './power-products.ts';

/** A reversible pair; `forward` is the arrow written first. */
export interface ReversiblePair {
  readonly forward: number;
  readonly backward: number;
}

/** A condition ∏ (k+/k−)^{u_j} = 1, u by reversible pair. */
export interface DetailedCondition extends BalanceCondition {
  /** Whether it closes a circuit of complexes or ties the reaction vectors of a spanning forest together. */
  readonly kind: 'circuit' | 'forest';
  readonly exponents: readonly bigint[];
}

/** Reversible pairs in order of writing, or null where some arrow has no reverse. */
export function reversiblePairs(context: TheoremContext): ReversiblePair[] | null {
  const { reverse } = context.structure.arrows;
  if (context.arrowWithoutReverse !== null) return null;
  return context.arrows
    .map((_, arrow) => arrow)
    .filter((arrow) => reverse[arrow]! > arrow)
    .map((arrow) => ({ forward: arrow, backward: reverse[arrow]! }));
}

/** Pairs times species up to which the conditions are worked out. */
const LARGEST = 40_000;

/**
 * The conditions of detailed balance for a reversible network: p − (n − ℓ) circuits, from the fundamental cycles of the
 * graph of complexes, and δ conditions on a spanning forest; p − s in all. Null where the network is not reversible or
 * too large. Wegscheider 1901; Feinberg 1989; Schuster, Schuster 1989.
 */
export function detailedConditions(context: TheoremContext): DetailedCondition[] | null {
  return context.memo('detailed conditions', () => {
    const pairs = reversiblePairs(context);
    if (pairs === null || pairs.length * context.species.length > LARGEST) return null;
    const forest = spanningForest(context, pairs);
    return [
      ...circuits(context, pairs, forest).map((exponents) => condition(context, pairs, 'circuit', exponents)),
      ...forestRelations(context, pairs, forest).map((exponents) =>
        condition(context, pairs, 'forest', exponents),
      ),
    ];
  });
}

/** A breadth-first spanning forest of the complexes. */
interface Forest {
  /** Pair that joins a complex to its parent, or −1 at a root. */
  readonly via: Int32Array;
  readonly parent: Int32Array;
  readonly depth: Int32Array;
  readonly inForest: readonly boolean[];
}

function spanningForest(context: TheoremContext, pairs: readonly ReversiblePair[]): Forest {
  const size = context.complexCount;
  const joined: number[][] = Array.from({ length: size }, () => []);
  pairs.forEach(({ forward }, j) => {
    joined[context.arrows[forward]!.from]!.push(j);
    joined[context.arrows[forward]!.to]!.push(j);
  });
  const via = new Int32Array(size).fill(-1);
  const parent = new Int32Array(size).fill(-1);
  const depth = new Int32Array(size).fill(-1);
  for (let root = 0; root < size; root++) {
    if (depth[root] !== -1) continue;
    depth[root] = 0;
    const queue = [root];
    for (const complex of queue) {
      for (const j of joined[complex]!) {
        const { from, to } = context.arrows[pairs[j]!.forward]!;
        const other = from === complex ? to : from;
        if (depth[other] !== -1) continue;
        depth[other] = depth[complex]! + 1;
        parent[other] = complex;
        via[other] = j;
        queue.push(other);
      }
    }
  }
  const used = new Set(via);
  return { via, parent, depth, inForest: pairs.map((_, j) => used.has(j)) };
}

/** One circuit for each pair outside the forest: along the pair, and back through the forest. */
function circuits(context: TheoremContext, pairs: readonly ReversiblePair[], forest: Forest): bigint[][] {
  return pairs.flatMap(({ forward }, j) => {
    if (forest.inForest[j]) return [];
    const exponents = pairs.map(() => 0n);
    exponents[j] = 1n;
    let { to: ahead, from: behind } = context.arrows[forward]!;
    while (ahead !== behind) {
      const climbAhead = forest.depth[ahead]! >= forest.depth[behind]!;
      const complex = climbAhead ? ahead : behind;
      const step = forest.via[complex]!;
      const leavesUpwards = context.arrows[pairs[step]!.forward]!.from === complex;
      // Ahead the circuit runs towards the root, behind it comes from there.
      exponents[step]! += leavesUpwards === climbAhead ? 1n : -1n;
      if (climbAhead) ahead = forest.parent[ahead]!;
      else behind = forest.parent[behind]!;
    }
    return [exponents];
  });
}

/** A basis of the integer relations among the reaction vectors of the forest. */
function forestRelations(
  context: TheoremContext,
  pairs: readonly ReversiblePair[],
  forest: Forest,
): bigint[][] {
  if (context.deficiency === 0) return [];
  const inside = pairs.map((_, j) => j).filter((j) => forest.inForest[j]);
  const rows = context.species.map((_, i) =>
    inside.map((j) => {
      const { from, to } = context.arrows[pairs[j]!.forward]!;
      return context.coefficients.scaled(to, i) - context.coefficients.scaled(from, i);
    }),
  );
  return integerKernel(matrixOfRows(rows, inside.length)).map((relation) => {
    const exponents = pairs.map(() => 0n);
    primitiveWithPositiveLead(relation).forEach((value, k) => (exponents[inside[k]!] = value));
    return exponents;
  });
}

function condition(
  context: TheoremContext,
  pairs: readonly ReversiblePair[],
  kind: DetailedCondition['kind'],
  exponents: readonly bigint[],
): DetailedCondition {
  const constants = context.exactConstants;
  const left: { arrow: number; exponent: number }[] = [];
  const right: { arrow: number; exponent: number }[] = [];
  exponents.forEach((exponent, j) => {
    if (exponent === 0n) return;
    const { forward, backward } = pairs[j]!;
    const size = Number(exponent > 0n ? exponent : -exponent);
    left.push({ arrow: exponent > 0n ? forward : backward, exponent: size });
    right.push({ arrow: exponent > 0n ? backward : forward, exponent: size });
  });
  const text = (side: typeof left): string =>
    side
      .map(
        ({ arrow, exponent }) => `${context.constants.names[arrow]!}${exponent === 1 ? '' : `^${exponent}`}`,
      )
      .join('*');
  const value = (side: typeof left): string | null =>
    constants && productText(side.map(({ arrow, exponent }) => ({ value: constants[arrow]!, exponent })));
  return {
    kind,
    expression: `${text(left)} = ${text(right)}`,
    left: value(left),
    right: value(right),
    holds:
      constants &&
      productIsOne(exponents.flatMap((exponent, j) => ratioPowers(constants, pairs[j]!, exponent))),
    exponents,
  };
}

function ratioPowers(
  constants: readonly Rational[],
  { forward, backward }: ReversiblePair,
  exponent: bigint,
) {
  return exponent === 0n
    ? []
    : [...powersOf(constants[forward]!, exponent), ...powersOf(constants[backward]!, -exponent)];
}
