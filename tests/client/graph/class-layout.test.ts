import fc from 'fast-check';
import Elk from 'elkjs/lib/elk.bundled.js';
import { describe, expect, test } from 'vitest';
import { layOutClass } from '../../../packages/client/src/graph/classLayout.ts';
import type { ComplexClass } from '../../../packages/client/src/graph/complexClasses.ts';
import { packClasses } from '../../../packages/client/src/graph/packClasses.ts';
import { layOutSpecies, speciesGraph } from '../../../packages/client/src/graph/speciesGraph.ts';
import type { StructureResult } from '../../../packages/client/src/components/results/shapes.ts';

const library = new Elk();
const layOut = library.layout.bind(library);
const sizes = { node: 24, arrow: 44, width: 616 };

interface Placed {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Pairs of boxes that share more than an edge. */
const overlaps = (boxes: readonly Placed[]) =>
  boxes.flatMap((a, i) =>
    boxes
      .slice(i + 1)
      .filter(
        (b) =>
          a.x + a.width > b.x + 0.01 &&
          b.x + b.width > a.x + 0.01 &&
          a.y + a.height > b.y + 0.01 &&
          b.y + b.height > a.y + 0.01,
      ),
  );

/** A connected class: each complex hangs on an earlier one, and some more arrows. */
const someClass = fc
  .integer({ min: 2, max: 24 })
  .chain((count) =>
    fc.record({
      parents: fc.array(fc.nat(), { minLength: count - 1, maxLength: count - 1 }),
      more: fc.array(fc.tuple(fc.nat(count - 1), fc.nat(count - 1)), { maxLength: 8 }),
      widths: fc.array(fc.integer({ min: 24, max: 120 }), { minLength: count, maxLength: count }),
    }),
  )
  .map(({ parents, more, widths }): ComplexClass => {
    const pairs = [
      ...parents.map((parent, i) => [parent % (i + 1), i + 1] as const),
      ...more.filter(([from, to]) => from !== to),
    ];
    const once = new Map(
      pairs.map(([from, to]) => [`${Math.min(from, to)} ${Math.max(from, to)}`, { from, to }]),
    );
    return {
      number: 1,
      nodes: widths.map((width, index) => ({ index, label: `C${index}`, width, terminal: false })),
      edges: [...once.values()].map(({ from, to }, i) => ({
        from,
        to,
        both: i % 3 === 0,
        label: `R${i + 1}`,
      })),
      terminal: [],
      rank: widths.length - 1,
      deficiency: 0,
    };
  });

describe('linkage classes of any form', () => {
  test('no two complexes overlap, no arrow is lost, and arrows end where they are said to', async () => {
    await fc.assert(
      fc.asyncProperty(someClass, async (of) => {
        const placed = await layOutClass(of, sizes, layOut);
        expect(overlaps(placed.nodes)).toEqual([]);
        expect(placed.edges).toHaveLength(of.edges.length);
        const near = (node: Placed | undefined, point: { x: number; y: number } | undefined) =>
          node !== undefined &&
          point !== undefined &&
          point.x >= node.x - 1 &&
          point.x <= node.x + node.width + 1 &&
          point.y >= node.y - 1 &&
          point.y <= node.y + node.height + 1;
        for (const { from, to, points } of placed.edges) {
          const node = (wanted: number) => placed.nodes.find(({ index }) => index === wanted);
          expect(near(node(from), points[0])).toBe(true);
          expect(near(node(to), points.at(-1))).toBe(true);
        }
        for (const node of placed.nodes) {
          expect(node.x + node.width).toBeLessThanOrEqual(placed.width + 1);
          expect(node.y + node.height).toBeLessThanOrEqual(placed.height + 1);
        }
      }),
      { seed: 20261201, numRuns: 20 },
    );
  });

  test('classes on one page do not overlap, and stand largest first', async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(someClass, { minLength: 1, maxLength: 6 }), async (classes) => {
        const placed = await Promise.all(classes.map((one) => layOutClass(one, sizes, layOut)));
        const { classes: packed } = packClasses(placed, sizes.width, 60);
        expect(overlaps(packed)).toEqual([]);
        const counts = packed.map(({ nodes }) => nodes.length);
        expect(counts).toEqual([...counts].sort((a, b) => b - a));
      }),
      { seed: 20261201, numRuns: 6 },
    );
  });

  test('a ring of thirty complexes is folded to the width of the page', async () => {
    const of: ComplexClass = {
      number: 1,
      nodes: Array.from({ length: 30 }, (_, index) => ({
        index,
        label: `C${index}`,
        width: 50,
        terminal: true,
      })),
      edges: Array.from({ length: 30 }, (_, i) => ({ from: i, to: (i + 1) % 30, both: false, label: '' })),
      terminal: [],
      rank: 29,
      deficiency: 0,
    };
    const placed = await layOutClass(of, sizes, layOut);
    expect(placed.width).toBeLessThanOrEqual(sizes.width);
    expect(overlaps(placed.nodes)).toEqual([]);
  });
});

describe('the species–reaction graph', () => {
  const structure = {
    species: ['E', 'S', 'ES', 'P'],
    complexes: [{ of: { E: 1, S: 2 } }, { of: { ES: 1 } }, { of: { E: 1, P: 1 } }],
    reactions: [
      { row: 0, from: 0, to: 1, reverse: 1 },
      { row: 0, from: 1, to: 0, reverse: 0 },
      { row: 1, from: 1, to: 2, reverse: null },
    ],
  } as unknown as StructureResult;

  test('has one node a species and one a reaction, both ways together, with molecules beside the lines', () => {
    const { nodes, edges } = speciesGraph(structure);
    expect(nodes.map(({ label }) => label)).toEqual(['E', 'S', 'ES', 'P', 'R1', 'R2']);
    expect(nodes.at(4)?.reactions).toEqual([0, 1]);
    expect(edges.map(({ from, to, label, both }) => [from, to, label, both])).toEqual([
      ['s:E', 'r:0', '', true],
      ['s:S', 'r:0', '2', true],
      ['r:0', 's:ES', '', true],
      ['s:ES', 'r:2', '', false],
      ['r:2', 's:E', '', false],
      ['r:2', 's:P', '', false],
    ]);
  });

  test('is placed without overlap', async () => {
    const placed = await layOutSpecies(speciesGraph(structure), 616, (label) => label.length * 9, layOut);
    expect(overlaps(placed.nodes)).toEqual([]);
    expect(placed.edges).toHaveLength(6);
  });
});
