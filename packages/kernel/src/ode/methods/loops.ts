import { Graph, makeTape, type Node, type Output, type Routine, spaces } from '../../program/index.ts';

/** Builds the tape of one turn of a loop over the components of vectors, given by their first slots. */
export class VectorLoop {
  readonly graph = new Graph();
  private readonly outputs: Output[] = [];

  /** The component of the vector that begins at `region`. */
  at(region: number): Node {
    return this.graph.load(region, spaces.first);
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
    this.outputs.push({ node, slot: region, space: spaces.first });
  }

  /** slot += node over all turns; the caller sets the slot to 0 before. */
  accumulate(slot: number, node: Node): void {
    this.outputs.push({ node: this.graph.add(this.graph.load(slot), node), slot, space: spaces.fixed });
  }

  /** atol + rtol · max(|a|, |b|). */
  scale(absoluteTolerance: number, relativeToleranceSlot: number, a: Node, b: Node): Node {
    const { graph } = this;
    const size = graph.max(graph.abs(a), graph.abs(b));
    return graph.add(this.at(absoluteTolerance), graph.multiply(this.scalar(relativeToleranceSlot), size));
  }

  routine(dimension: number): Routine {
    return { kind: 'loop', tape: makeTape(this.graph, this.outputs), count: dimension };
  }
}

/** A routine that sets the time of the right-hand side to start + c · h. */
export function setTime(timeSlot: number, startSlot: number, stepSlot: number, c: number): Routine {
  const graph = new Graph();
  const passed = graph.multiply(graph.constant(c), graph.load(stepSlot));
  const node = graph.add(graph.load(startSlot), passed);
  return { kind: 'straight', tapes: [makeTape(graph, [{ node, slot: timeSlot, space: spaces.fixed }])] };
}
