import type { ComplexClass, ComplexNode } from './complexClasses.ts';
import type { Point } from './geometry.ts';

export interface PlacedNode extends ComplexNode {
  /** Top left corner. */
  readonly x: number;
  readonly y: number;
  readonly height: number;
}

export interface PlacedEdge {
  /** Indices of the complexes it runs between; its points run the same way. */
  readonly from: number;
  readonly to: number;
  readonly points: readonly Point[];
  readonly both: boolean;
  readonly label: string;
}

/** A linkage class with places, its corner at 0, 0. */
export interface PlacedClass {
  readonly of: ComplexClass;
  readonly nodes: readonly PlacedNode[];
  readonly edges: readonly PlacedEdge[];
  readonly width: number;
  readonly height: number;
}

export interface Sizes {
  /** Height of a complex. */
  readonly node: number;
  /** Length of an arrow. */
  readonly arrow: number;
  /** Room of the page. */
  readonly width: number;
}

/** The complexes of a class from end to end where its lines make one chain; null otherwise. */
export function chainOf({ nodes, edges }: ComplexClass): readonly number[] | null {
  if (edges.length !== nodes.length - 1) return null;
  const next = new Map<number, number[]>(nodes.map(({ index }) => [index, []]));
  for (const { from, to } of edges) {
    next.get(from)?.push(to);
    next.get(to)?.push(from);
  }
  if ([...next.values()].some((joined) => joined.length > 2)) return null;
  const begin = nodes.find(({ index }) => (next.get(index)?.length ?? 0) <= 1);
  if (begin === undefined) return null;
  const chain = [begin.index];
  for (let last = begin.index, before = -1; ;) {
    const following = next.get(last)?.find((index) => index !== before);
    if (following === undefined) break;
    before = last;
    last = following;
    chain.push(last);
  }
  return chain.length === nodes.length ? chain : null;
}

/** Sets a chain like a line of text, folded where it is wider than the page. Needs no layout library. */
export function layOutChain(of: ComplexClass, chain: readonly number[], sizes: Sizes): PlacedClass {
  const byIndex = new Map(of.nodes.map((node) => [node.index, node]));
  const step = sizes.node + 38;
  const nodes: PlacedNode[] = [];
  const edges: PlacedEdge[] = [];
  let x = 0;
  let y = 14;
  let width = 0;
  chain.forEach((index, i) => {
    const node = byIndex.get(index);
    if (node === undefined) return;
    const before = nodes.at(-1);
    const folds = before !== undefined && x + node.width > sizes.width - 12;
    if (folds) {
      x = 14;
      y += step;
    }
    const placed = { ...node, x, y, height: sizes.node };
    if (before !== undefined) {
      const edge = of.edges.find(
        ({ from, to }) => (from === before.index && to === index) || (to === before.index && from === index),
      );
      const a = { x: before.x + before.width, y: before.y + sizes.node / 2 };
      const b = { x: placed.x, y: placed.y + sizes.node / 2 };
      const points = folds
        ? [
            a,
            { x: a.x + 10, y: a.y },
            { x: a.x + 10, y: a.y + step / 2 },
            { x: 2, y: a.y + step / 2 },
            { x: 2, y: b.y },
            b,
          ]
        : [a, b];
      if (edge !== undefined)
        edges.push({
          from: edge.from,
          to: edge.to,
          points: edge.from === index ? [...points].reverse() : points,
          both: edge.both,
          label: edge.label,
        });
    }
    nodes.push(placed);
    x += node.width + (i < chain.length - 1 ? sizes.arrow : 0);
    width = Math.max(width, placed.x + placed.width + (folds ? 0 : 2));
  });
  return { of, nodes, edges, width: Math.max(width, 40), height: y + sizes.node + 4 };
}
