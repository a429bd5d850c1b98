import { describe, expect, test } from 'vitest';
import { chainOf, layOutChain } from '../../../packages/client/src/graph/chainLayout.ts';
import type { ComplexClass } from '../../../packages/client/src/graph/complexClasses.ts';
import { terminalGrounds } from '../../../packages/client/src/graph/hull.ts';
import { packClasses } from '../../../packages/client/src/graph/packClasses.ts';

const sizes = { node: 30, arrow: 80, width: 600 };

function classOf(
  pairs: readonly (readonly [number, number])[],
  terminal: readonly number[][] = [],
): ComplexClass {
  const indices = [...new Set(pairs.flat())];
  return {
    number: 1,
    nodes: indices.map((index) => ({ index, label: `C${index}`, width: 40, terminal: false })),
    edges: pairs.map(([from, to]) => ({ from, to, both: false, label: `R${from}` })),
    terminal,
    rank: indices.length - 1,
    deficiency: 0,
  };
}

describe('linkage classes that are chains', () => {
  test('are found whichever way their arrows point', () => {
    expect(
      chainOf(
        classOf([
          [1, 0],
          [1, 2],
        ]),
      ),
    ).toEqual([0, 1, 2]);
  });

  test('cycles and branchings are none', () => {
    expect(
      chainOf(
        classOf([
          [0, 1],
          [1, 2],
          [2, 0],
        ]),
      ),
    ).toBeNull();
    expect(
      chainOf(
        classOf([
          [0, 1],
          [0, 2],
          [0, 3],
        ]),
      ),
    ).toBeNull();
  });

  test('an arrow against the chain is drawn against it', () => {
    const of = classOf([[1, 0]]);
    const placed = layOutChain(of, [1, 0], sizes);
    const [edge] = placed.edges;
    expect(edge?.points[0]?.x).toBeLessThan(edge?.points.at(-1)?.x ?? 0);
    const turned = layOutChain(of, [0, 1], sizes).edges[0];
    expect(turned?.points[0]?.x).toBeGreaterThan(turned?.points.at(-1)?.x ?? 0);
  });

  test('a chain wider than the page is folded and no complexes overlap', () => {
    const pairs = Array.from({ length: 19 }, (_, i) => [i, i + 1] as const);
    const of = classOf(pairs);
    const placed = layOutChain(of, chainOf(of) ?? [], sizes);
    expect(placed.width).toBeLessThanOrEqual(sizes.width);
    for (const a of placed.nodes)
      for (const b of placed.nodes)
        if (a.index < b.index) expect(a.y !== b.y || a.x + a.width <= b.x || b.x + b.width <= a.x).toBe(true);
    expect(placed.edges).toHaveLength(19);
  });
});

describe('what stands on sand', () => {
  test('one ground for neighbours, one each where another complex stands between', () => {
    const placed = (terminal: readonly number[][]) => {
      const of = classOf(
        [
          [0, 1],
          [1, 2],
        ],
        terminal,
      );
      return terminalGrounds(layOutChain(of, [0, 1, 2], sizes));
    };
    expect(placed([[1, 2]])).toHaveLength(1);
    expect(placed([[0, 2]])).toHaveLength(2);
  });
});

test('classes are packed largest first, without overlap, within the page', () => {
  const chain = (length: number) => {
    const of = classOf(Array.from({ length }, (_, i) => [i, i + 1] as const));
    return layOutChain(of, chainOf(of) ?? [], sizes);
  };
  const packed = packClasses([chain(1), chain(4), chain(1), chain(2)], sizes.width, 100);
  expect(packed.classes.map(({ nodes }) => nodes.length)).toEqual([5, 3, 2, 2]);
  for (const one of packed.classes) expect(one.x + one.width).toBeLessThanOrEqual(sizes.width + 1);
  for (const a of packed.classes)
    for (const b of packed.classes)
      if (a !== b)
        expect(
          a.y + a.height <= b.y || b.y + b.height <= a.y || a.x + a.width <= b.x || b.x + b.width <= a.x,
        ).toBe(true);
});
