import {
  assemble,
  gradient,
  Graph,
  hostNumber,
  makeTape,
  type Node,
  spaces,
} from '@stillroom/kernel/program';
import { describe, expect, test } from 'vitest';

type Build = (graph: Graph, x: Node, y: Node) => Node;
const call =
  (name: Parameters<typeof hostNumber>[0]): Build =>
  (graph, x) =>
    graph.call(hostNumber(name), x);

/** Functions and places (x, y) inside their domains, away from corners. */
const cases: readonly (readonly [string, Build, number, number])[] = [
  ['x + y', (graph, x, y) => graph.add(x, y), 1, 2],
  ['x - y', (graph, x, y) => graph.subtract(x, y), 1, 2],
  ['x y', (graph, x, y) => graph.multiply(x, y), 3, -2],
  ['x x', (graph, x) => graph.multiply(x, x), 3, 0],
  ['x / y', (graph, x, y) => graph.divide(x, y), 3, -2],
  ['x / x²', (graph, x) => graph.divide(x, graph.multiply(x, x)), 3, 1],
  ['-x', (graph, x) => graph.negate(x), 3, 1],
  ['|x|', (graph, x) => graph.abs(x), -3, 1],
  ['√x', (graph, x) => graph.sqrt(x), 2, 1],
  ['min', (graph, x, y) => graph.min(x, y), 1, 2],
  ['max', (graph, x, y) => graph.max(x, y), 1, 2],
  ['if', (graph, x, y) => graph.select(graph.less(x, y), graph.multiply(x, y), y), 1, 2],
  ['floor', (graph, x, y) => graph.add(graph.floor(x), y), 1.5, 2],
  ['x^y', (graph, x, y) => graph.call(hostNumber('pow'), x, y), 1.7, 2.3],
  ['exp', call('exp'), 0.3, 1],
  ['ln', call('ln'), 0.3, 1],
  ['log10', call('log10'), 0.3, 1],
  ['sin', call('sin'), 0.3, 1],
  ['cos', call('cos'), 0.3, 1],
  ['tan', call('tan'), 0.3, 1],
  ['sinh', call('sinh'), 0.3, 1],
  ['cosh', call('cosh'), 0.3, 1],
  ['tanh', call('tanh'), 0.3, 1],
  ['asin', call('asin'), 0.3, 1],
  ['acos', call('acos'), 0.3, 1],
  ['atan', call('atan'), 0.3, 1],
  ['round', call('round'), 0.3, 1],
];

describe('derivatives agree with central differences', () => {
  test.each(cases)('%s', (_, build, x, y) => {
    const graph = new Graph();
    const places = [graph.load(0, spaces.first), graph.load(1, spaces.first)] as const;
    const value = build(graph, ...places);
    const slopes = gradient(graph, value, (node) => places.includes(node));
    const none = graph.constant(0);
    const nodes = [value, slopes.get(places[0]) ?? none, slopes.get(places[1]) ?? none];
    const tape = makeTape(
      graph,
      nodes.map((node, slot) => ({ node, slot, space: spaces.second })),
    );
    const assembly = assemble(16, () => new Map([['f', { kind: 'straight', tapes: [tape] }]]));
    const at = (a: number, b: number): number[] => {
      assembly.memory.set([a, b], 0);
      assembly.routine('f')(0, 8);
      return [...assembly.memory.slice(8, 11)];
    };
    const h = 1e-5;
    const [, byX, byY] = at(x, y);
    expect(byX).toBeCloseTo((at(x + h, y)[0]! - at(x - h, y)[0]!) / (2 * h), 7);
    expect(byY).toBeCloseTo((at(x, y + h)[0]! - at(x, y - h)[0]!) / (2 * h), 7);
  });
});
