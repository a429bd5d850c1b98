import { type Graph, type Node, operandCounts, operands, operations } from './graph.ts';
import { hostFunctions, type HostName, hostNumber } from './host-functions.ts';

/**
 * Derivatives of `of` with respect to every node that it depends on and that `isVariable`, as new nodes of the graph (reverse
 * accumulation: Griewank, Walther, Evaluating Derivatives, 2008). Where a function has a corner the derivative of one
 * side is taken; comparisons, `floor`, `ceil` and `round` count as constant.
 */
export function gradient(graph: Graph, of: Node, isVariable: (node: Node) => boolean): Map<Node, Node> {
  const depends = dependence(graph, of, isVariable);
  const adjoint = new Map<Node, Node>([[of, graph.constant(1)]]);
  const found = new Map<Node, Node>();
  for (const node of [...depends].sort((a, b) => b - a)) {
    const weight = adjoint.get(node);
    if (weight === undefined || graph.isConstant(weight, 0)) continue;
    if (isVariable(node)) {
      found.set(node, weight);
      continue;
    }
    const parts = operands(graph, node);
    parts.forEach((operand, position) => {
      if (!depends.has(operand)) return;
      const term = weighted(graph, node, position, weight);
      if (term === null) return;
      const sum = adjoint.get(operand);
      adjoint.set(operand, sum === undefined ? term : graph.add(sum, term));
    });
  }
  return found;
}

/** By node: 1 where it depends on `source` or is it. */
export function nodesAbove(graph: Graph, source: Node): Uint8Array {
  const above = new Uint8Array(graph.size);
  above[source] = 1;
  for (let node = source + 1; node < above.length; node++) {
    const count = operandCounts[graph.operation[node]!]!;
    if (
      (count > 0 && above[graph.left[node]!] === 1) ||
      (count > 1 && above[graph.right[node]!] === 1) ||
      (count > 2 && above[graph.third[node]!] === 1)
    )
      above[node] = 1;
  }
  return above;
}

/** The nodes under `of`, itself included, that lead to a variable. */
function dependence(graph: Graph, of: Node, isVariable: (node: Node) => boolean): Set<Node> {
  const seen = new Set<Node>();
  const stack = [of];
  for (let node = stack.pop(); node !== undefined; node = stack.pop()) {
    if (seen.has(node)) continue;
    seen.add(node);
    for (const operand of operands(graph, node)) stack.push(operand);
  }
  const depends = new Set<Node>();
  for (const node of [...seen].sort((a, b) => a - b)) {
    if (isVariable(node) || operands(graph, node).some((operand) => depends.has(operand))) depends.add(node);
  }
  return depends;
}

/** `weight` times the partial derivative of `node` by its operand at `position`; null where that is 0. */
function weighted(graph: Graph, node: Node, position: number, weight: Node): Node | null {
  const a = graph.left[node]!;
  const b = graph.right[node]!;
  switch (graph.operation[node]!) {
    case operations.add:
      return weight;
    case operations.subtract:
      return position === 0 ? weight : graph.negate(weight);
    case operations.multiply:
      return graph.multiply(weight, position === 0 ? b : a);
    case operations.divide:
      return position === 0
        ? graph.divide(weight, b)
        : graph.negate(graph.divide(graph.multiply(weight, node), b));
    case operations.negate:
      return graph.negate(weight);
    case operations.abs:
      return graph.select(graph.less(a, graph.constant(0)), graph.negate(weight), weight);
    case operations.sqrt:
      return graph.divide(weight, graph.multiply(graph.constant(2), node));
    case operations.min:
    case operations.max: {
      const first = graph.equal(node, a);
      const none = graph.constant(0);
      return position === 0 ? graph.select(first, weight, none) : graph.select(first, none, weight);
    }
    case operations.select:
      if (position === 0) return null;
      return position === 1
        ? graph.select(a, weight, graph.constant(0))
        : graph.select(a, graph.constant(0), weight);
    case operations.call: {
      const slope = slopes[hostFunctions[graph.third[node]!]!.name](graph, node, a, b, position);
      return slope === null ? null : graph.multiply(weight, slope);
    }
    default:
      return null;
  }
}

type Slope = (graph: Graph, node: Node, a: Node, b: Node, position: number) => Node | null;

const square = (graph: Graph, a: Node): Node => graph.multiply(a, a);
const onePlus = (graph: Graph, a: Node): Node => graph.add(graph.constant(1), a);
const oneMinus = (graph: Graph, a: Node): Node => graph.subtract(graph.constant(1), a);
const inverse = (graph: Graph, a: Node): Node => graph.divide(graph.constant(1), a);

/** Derivative of each host function by the operand at `position`; functions of one argument have it twice, so only the first counts. */
const slopes: Readonly<Record<HostName, Slope>> = {
  exp: first((_graph, node) => node),
  ln: first((graph, _node, a) => inverse(graph, a)),
  log10: first((graph, _node, a) => graph.divide(graph.constant(Math.LOG10E), a)),
  sin: first((graph, _node, a) => graph.call(hostNumber('cos'), a)),
  cos: first((graph, _node, a) => graph.negate(graph.call(hostNumber('sin'), a))),
  tan: first((graph, node) => onePlus(graph, square(graph, node))),
  sinh: first((graph, _node, a) => graph.call(hostNumber('cosh'), a)),
  cosh: first((graph, _node, a) => graph.call(hostNumber('sinh'), a)),
  tanh: first((graph, node) => oneMinus(graph, square(graph, node))),
  asin: first((graph, _node, a) => inverse(graph, graph.sqrt(oneMinus(graph, square(graph, a))))),
  acos: first((graph, _node, a) =>
    graph.negate(inverse(graph, graph.sqrt(oneMinus(graph, square(graph, a))))),
  ),
  atan: first((graph, _node, a) => inverse(graph, onePlus(graph, square(graph, a)))),
  round: () => null,
  pow: (graph, node, a, b, position) => {
    if (position === 0) {
      const lower = graph.call(hostNumber('pow'), a, graph.subtract(b, graph.constant(1)));
      return graph.multiply(b, lower);
    }
    const zero = graph.constant(0);
    return graph.select(graph.less(zero, a), graph.multiply(node, graph.call(hostNumber('ln'), a)), zero);
  },
};

function first(slope: (graph: Graph, node: Node, a: Node) => Node): Slope {
  return (graph, node, a, _b, position) => (position === 0 ? slope(graph, node, a) : null);
}
