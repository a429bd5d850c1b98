import {
  Graph,
  makeTape,
  type Node,
  type Output,
  type Routine,
  type Space,
  spaces,
} from '../../program/index.ts';

/** Up to this dimension loops over components are written out. */
const unrolledDimension = 4;

/**
 * A routine that does the same for every component of vectors: `body` describes it for one component. Short vectors
 * are unrolled, which does the same operations in the same order.
 */
export function forEachComponent(dimension: number, body: (component: Component) => void): Routine {
  const graph = new Graph();
  const sums = new Map<number, Node>();
  const written: Output[] = [];
  if (dimension > unrolledDimension) {
    const component = new Component(graph, spaces.first, 0, sums, written);
    body(component);
    return { kind: 'loop', tape: makeTape(graph, [...written, ...sumOutputs(sums)]), count: dimension };
  }
  for (let i = 0; i < dimension; i++) body(new Component(graph, spaces.fixed, i, sums, written));
  return { kind: 'straight', tapes: [makeTape(graph, [...written, ...sumOutputs(sums)])] };
}

function sumOutputs(sums: ReadonlyMap<number, Node>): Output[] {
  return [...sums].map(([slot, node]) => ({ node, slot, space: spaces.fixed }));
}

/** One component of vectors that are given by their first slots. */
export class Component {
  readonly graph: Graph;
  private readonly space: Space;
  private readonly offset: number;
  private readonly sums: Map<number, Node>;
  private readonly written: Output[];

  constructor(graph: Graph, space: Space, offset: number, sums: Map<number, Node>, written: Output[]) {
    this.graph = graph;
    this.space = space;
    this.offset = offset;
    this.sums = sums;
    this.written = written;
  }

  at(region: number): Node {
    return this.graph.load(region + this.offset, this.space);
  }

  scalar(slot: number): Node {
    return this.graph.load(slot);
  }

  /** Σ coefficient · vector, left to right, terms with coefficient 0 left out. */
  combination(coefficients: readonly number[], regions: readonly number[]): Node {
    let sum = this.graph.constant(0);
    coefficients.forEach((coefficient, index) => {
      const term = this.graph.multiply(this.graph.constant(coefficient), this.at(regions[index]!));
      sum = this.graph.add(sum, term);
    });
    return sum;
  }

  write(region: number, node: Node): void {
    this.written.push({ node, slot: region + this.offset, space: this.space });
  }

  /** slot += node over all components; the caller sets the slot to 0 before. */
  accumulate(slot: number, node: Node): void {
    this.sums.set(slot, this.graph.add(this.sums.get(slot) ?? this.graph.load(slot), node));
  }

  /** atol + rtol · max(|a|, |b|). */
  scale(absoluteTolerance: number, relativeToleranceSlot: number, a: Node, b: Node): Node {
    const { graph } = this;
    const size = graph.max(graph.abs(a), graph.abs(b));
    return graph.add(this.at(absoluteTolerance), graph.multiply(this.scalar(relativeToleranceSlot), size));
  }
}

/** A routine that sets the time of the right-hand side to start + c · h. */
export function setTime(timeSlot: number, startSlot: number, stepSlot: number, c: number): Routine {
  const graph = new Graph();
  const passed = graph.multiply(graph.constant(c), graph.load(stepSlot));
  const node = graph.add(graph.load(startSlot), passed);
  return { kind: 'straight', tapes: [makeTape(graph, [{ node, slot: timeSlot, space: spaces.fixed }])] };
}

/** Copies a vector of memory to another place; short ones faster than by a call of `copyWithin`. */
export function copyVector(memory: Float64Array, to: number, from: number, dimension: number): void {
  if (dimension > 32) memory.copyWithin(to, from, from + dimension);
  else for (let i = 0; i < dimension; i++) memory[to + i] = memory[from + i]!;
}
