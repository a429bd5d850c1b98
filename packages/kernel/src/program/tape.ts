import { type Graph, type Node, operandCounts, operations, type Space, spaces } from './graph.ts';

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
  const mark = new Uint32Array(graph.size);
  const nodes: Node[] = [];
  for (const { node } of outputs) gather(graph, node, mark, 1, nodes);
  return renumber(graph, outputs, nodes, new Int32Array(graph.size));
}

/**
 * The tapes that compute `outputs` in turn, each of about `limit` nodes at most, so that no single routine becomes too
 * long to compile. No output may lie where a later tape reads.
 */
export function makeTapes(graph: Graph, outputs: readonly Output[], limit: number): Tape[] {
  const tapes: Tape[] = [];
  const mark = new Uint32Array(graph.size);
  const place = new Int32Array(graph.size);
  let group: Output[] = [];
  let nodes: Node[] = [];
  let epoch = 1;
  for (const output of outputs) {
    const before = nodes.length;
    gather(graph, output.node, mark, epoch, nodes);
    if (group.length > 0 && nodes.length > limit) {
      nodes.length = before;
      tapes.push(renumber(graph, group, nodes, place));
      epoch++;
      group = [];
      nodes = [];
      gather(graph, output.node, mark, epoch, nodes);
    }
    group.push(output);
  }
  if (group.length > 0) tapes.push(renumber(graph, group, nodes, place));
  return tapes;
}

/** Whether a tape reads a fixed slot. */
export function readsSlot(tape: Tape, slot: number): boolean {
  return tape.operation.some(
    (operation, node) =>
      operation === operations.load && tape.left[node] === slot && tape.right[node] === spaces.fixed,
  );
}

/** Appends the nodes that `root` needs and that do not yet bear the mark `epoch`, which they get. */
function gather(graph: Graph, root: Node, mark: Uint32Array, epoch: number, found: Node[]): void {
  if (mark[root] === epoch) return;
  const { operation, left, right, third } = graph;
  mark[root] = epoch;
  // Nodes whose operands are still to be looked at are those of `found` from `next` on.
  let next = found.push(root) - 1;
  for (; next < found.length; next++) {
    const node = found[next]!;
    const count = operandCounts[operation[node]!]!;
    if (count === 0) continue;
    const a = left[node]!;
    if (mark[a] !== epoch) {
      mark[a] = epoch;
      found.push(a);
    }
    if (count === 1) continue;
    const b = right[node]!;
    if (mark[b] !== epoch) {
      mark[b] = epoch;
      found.push(b);
    }
    if (count === 2) continue;
    const c = third[node]!;
    if (mark[c] !== epoch) {
      mark[c] = epoch;
      found.push(c);
    }
  }
}

/** `place` is scratch space of the graph's size, for where each node goes. */
function renumber(graph: Graph, outputs: readonly Output[], nodes: readonly Node[], place: Int32Array): Tape {
  const order = Int32Array.from(nodes).sort();
  const size = order.length;
  const operation = new Uint8Array(size);
  const left = new Int32Array(size);
  const right = new Int32Array(size);
  const third = new Int32Array(size);
  const constants = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    const node = order[i]!;
    place[node] = i;
    const kind = graph.operation[node]!;
    const count = operandCounts[kind]!;
    operation[i] = kind;
    if (kind === operations.constant) constants[i] = graph.value(node);
    else left[i] = count > 0 ? place[graph.left[node]!]! : graph.left[node]!;
    right[i] = count > 1 ? place[graph.right[node]!]! : graph.right[node]!;
    third[i] = count > 2 ? place[graph.third[node]!]! : graph.third[node]!;
  }
  const written = outputs.map(({ node, slot, space }) => ({ node: place[node]!, slot, space }));
  return { size, operation, left, right, third, constants, outputs: written };
}
