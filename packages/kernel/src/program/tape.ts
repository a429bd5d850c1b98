import { type Graph, type Node, operands, operations, type Space, spaces } from './graph.ts';

/** A number that a routine writes: the value of `node` goes to `slot` of `space`. */
export interface Output {
  readonly node: Node;
  readonly slot: number;
  readonly space: Space;
}

/**
 * A routine without branches: the nodes of a graph that some outputs need, renumbered in order. All reads happen
 * before the first write.
 */
export interface Tape {
  readonly size: number;
  readonly operation: Uint8Array;
  readonly left: Int32Array;
  readonly right: Int32Array;
  readonly third: Int32Array;
  /** By node, for constant nodes. */
  readonly constants: Float64Array;
  readonly outputs: readonly Output[];
}

/** The tape that computes `outputs`. */
export function makeTape(graph: Graph, outputs: readonly Output[]): Tape {
  return renumber(graph, outputs, reachable(graph, outputs, new Uint32Array(graph.size), 1));
}

/**
 * The tapes that compute `outputs` in turn, each of about `limit` nodes at most, so that no single routine becomes too
 * long to compile. No output may lie where a later tape reads.
 */
export function makeTapes(graph: Graph, outputs: readonly Output[], limit: number): Tape[] {
  const tapes: Tape[] = [];
  const mark = new Uint32Array(graph.size);
  let group: Output[] = [];
  let nodes: Node[] = [];
  let epoch = 1;
  for (const output of outputs) {
    const added = reachable(graph, [output], mark, epoch);
    if (group.length > 0 && nodes.length + added.length > limit) {
      tapes.push(renumber(graph, group, nodes));
      epoch++;
      group = [];
      nodes = reachable(graph, [output], mark, epoch);
    } else {
      for (const node of added) nodes.push(node);
    }
    group.push(output);
  }
  if (group.length > 0) tapes.push(renumber(graph, group, nodes));
  return tapes;
}

/** Whether a tape reads a fixed slot. */
export function readsSlot(tape: Tape, slot: number): boolean {
  return tape.operation.some(
    (operation, node) =>
      operation === operations.load && tape.left[node] === slot && tape.right[node] === spaces.fixed,
  );
}

/** The nodes that `outputs` need and that do not yet bear the mark `epoch`, which they get. */
function reachable(graph: Graph, outputs: readonly Output[], mark: Uint32Array, epoch: number): Node[] {
  const found: Node[] = [];
  const stack = outputs.map((output) => output.node);
  for (let node = stack.pop(); node !== undefined; node = stack.pop()) {
    if (mark[node] === epoch) continue;
    mark[node] = epoch;
    found.push(node);
    for (const operand of operands(graph, node)) stack.push(operand);
  }
  return found;
}

function renumber(graph: Graph, outputs: readonly Output[], nodes: Node[]): Tape {
  const order = Int32Array.from(nodes).sort();
  const size = order.length;
  const place = new Map<Node, number>();
  order.forEach((node, index) => place.set(node, index));
  const tape = {
    size,
    operation: new Uint8Array(size),
    left: new Int32Array(size),
    right: new Int32Array(size),
    third: new Int32Array(size),
    constants: new Float64Array(size),
    outputs: outputs.map(({ node, slot, space }) => ({ node: place.get(node)!, slot, space })),
  };
  order.forEach((node, index) => {
    const operation = graph.operation[node]!;
    tape.operation[index] = operation;
    if (operation === operations.constant) {
      tape.constants[index] = graph.value(node);
    } else if (operation === operations.load) {
      tape.left[index] = graph.left[node]!;
      tape.right[index] = graph.right[node]!;
    } else {
      const [a, b, c] = operands(graph, node);
      tape.left[index] = place.get(a!)!;
      tape.right[index] = b === undefined ? 0 : place.get(b)!;
      tape.third[index] =
        operation === operations.call ? graph.third[node]! : c === undefined ? 0 : place.get(c)!;
    }
  });
  return tape;
}
