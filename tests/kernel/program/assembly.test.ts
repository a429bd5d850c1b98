import {
  assemble,
  type Backend,
  Graph,
  hostNumber,
  makeTape,
  makeTapes,
  type Node,
  type Output,
  spaces,
} from '@stillroom/kernel/program';
import fc from 'fast-check';
import { describe, expect, test, vi } from 'vitest';

const inputs = 4;
const results = 6;

/** A recipe for a random graph: each entry makes one node from earlier ones. */
const recipe = fc.array(fc.tuple(fc.nat(15), fc.nat(), fc.nat(), fc.nat()), { minLength: 1, maxLength: 60 });
const interesting = fc.oneof(
  fc.double({ noNaN: true, min: -10, max: 10 }),
  fc.constantFrom(0, -0, 1, -1, 1e300, 1e-300, Infinity, -Infinity, NaN),
);

function build(graph: Graph, steps: readonly (readonly [number, number, number, number])[]): Node[] {
  const nodes: Node[] = Array.from({ length: inputs }, (_, slot) => graph.load(slot, spaces.first));
  for (const [kind, x, y, z] of steps) {
    const [a, b, c] = [x, y, z].map((pick) => nodes[pick % nodes.length]!) as [Node, Node, Node];
    const made = [
      () => graph.constant((x % 7) - 3),
      () => graph.add(a, b),
      () => graph.subtract(a, b),
      () => graph.multiply(a, b),
      () => graph.divide(a, b),
      () => graph.negate(a),
      () => graph.abs(a),
      () => graph.sqrt(a),
      () => graph.min(a, b),
      () => graph.max(a, b),
      () => graph.floor(a),
      () => graph.ceil(a),
      () => graph.less(a, b),
      () => graph.lessEqual(a, b),
      () => graph.select(graph.equal(a, b), b, c),
      () => graph.select(a, b, graph.call(hostNumber('pow'), c, a)),
    ][kind]!;
    nodes.push(made());
  }
  return nodes.slice(-results);
}

function run(backend: Backend, tapes: ReturnType<typeof makeTapes>, values: readonly number[]): bigint[] {
  const assembly = assemble(100, () => new Map([['all', { kind: 'straight', tapes }]]), { backend });
  assembly.memory.set(values, 20);
  assembly.routine('all')(20, 50);
  const out = assembly.memory.slice(50, 50 + results);
  return Array.from(out, (value) =>
    Number.isNaN(value) ? -1n : new BigUint64Array(Float64Array.of(value).buffer)[0]!,
  );
}

describe('a program', () => {
  test('gives the same bits as WebAssembly and interpreted, whole or cut into tapes', () => {
    fc.assert(
      fc.property(
        recipe,
        fc.array(interesting, { minLength: inputs, maxLength: inputs }),
        (steps, values) => {
          const graph = new Graph();
          const outputs = build(graph, steps).map<Output>((node, slot) => ({
            node,
            slot,
            space: spaces.second,
          }));
          const whole = run('wasm', [makeTape(graph, outputs)], values);
          expect(run('interpreted', [makeTape(graph, outputs)], values)).toEqual(whole);
          expect(run('wasm', makeTapes(graph, outputs, 5), values)).toEqual(whole);
          expect(run('interpreted', makeTapes(graph, outputs, 5), values)).toEqual(whole);
        },
      ),
      { seed: 20261201, numRuns: 300 },
    );
  });

  test.each(['wasm', 'interpreted'] as const)('runs loops, sequences and host routines (%s)', (backend) => {
    const graph = new Graph();
    const doubled = graph.multiply(graph.constant(2), graph.load(0, spaces.first));
    const sum = graph.add(graph.load(1), doubled);
    const tape = makeTape(graph, [
      { node: doubled, slot: 0, space: spaces.second },
      { node: sum, slot: 1, space: spaces.fixed },
    ]);
    const seen: number[][] = [];
    const assembly = assemble(
      32,
      () =>
        new Map([
          ['double', { kind: 'loop', tape, count: 3 } as const],
          [
            'outside',
            { kind: 'host', run: (first = 0, second = 0) => void seen.push([first, second]) } as const,
          ],
          [
            'both',
            {
              kind: 'sequence',
              calls: [
                { routine: 'double', first: 10, second: 20 },
                { routine: 'outside', first: 3, second: 4 },
              ],
            } as const,
          ],
        ]),
      { backend },
    );
    assembly.memory.set([1, 2, 3], 10);
    assembly.routine('both')();
    expect([...assembly.memory.slice(20, 24)]).toEqual([2, 4, 6, 0]);
    expect(assembly.memory[1]).toBe(12);
    expect(seen).toEqual([[3, 4]]);
    expect(() => assembly.routine('none')).toThrow('no routine "none"');
  });

  test.each(['wasm', 'interpreted'] as const)('reads everything before it writes (%s)', (backend) => {
    const graph = new Graph();
    const [a, b] = [graph.load(2), graph.load(3)];
    const tape = makeTape(graph, [
      { node: b, slot: 2, space: spaces.fixed },
      { node: a, slot: 3, space: spaces.fixed },
    ]);
    const assembly = assemble(8, () => new Map([['swap', { kind: 'straight', tapes: [tape] }]]), { backend });
    assembly.memory.set([5, 6], 2);
    assembly.routine('swap')();
    expect([...assembly.memory.slice(2, 4)]).toEqual([6, 5]);
  });

  test('falls back on the interpreter where WebAssembly may not be compiled', () => {
    const compile = vi.spyOn(WebAssembly, 'Module').mockImplementation(function refuse() {
      throw new WebAssembly.CompileError('refused by the content policy');
    });
    try {
      expect(assemble(8, () => new Map()).backend).toBe('interpreted');
      expect(() => assemble(8, () => new Map(), { backend: 'wasm' })).toThrow('refused');
    } finally {
      compile.mockRestore();
    }
    expect(assemble(8, () => new Map()).backend).toBe('wasm');
  });
});
