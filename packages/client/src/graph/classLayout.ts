import type { ElkNode } from 'elkjs/lib/elk-api.js';
import { chainOf, layOutChain, type PlacedClass, type Sizes } from './chainLayout.ts';
import type { ComplexClass } from './complexClasses.ts';
import { layOut as layOutAside } from './elk.ts';

const flowing: Readonly<Record<string, string>> = {
  'elk.algorithm': 'layered',
  'elk.direction': 'RIGHT',
  'elk.edgeRouting': 'POLYLINE',
  'elk.spacing.nodeNode': '22',
  'elk.spacing.edgeNode': '12',
  'elk.layered.thoroughness': '30',
  'elk.separateConnectedComponents': 'false',
  'elk.padding': '[top=14,left=2,bottom=4,right=2]',
};

/** Wrapping a wide class like a line of text: the flattest form that fits the page wins. */
const aspects = ['9', '7', '5', '4', '3', '2', '1'];

/** The layout library, wherever it runs. */
export type LayOut = (graph: ElkNode) => Promise<ElkNode>;

function graphOf(of: ComplexClass, sizes: Sizes, extra: Readonly<Record<string, string>> = {}): ElkNode {
  return {
    id: 'class',
    layoutOptions: { ...flowing, 'elk.layered.spacing.nodeNodeBetweenLayers': String(sizes.arrow), ...extra },
    children: of.nodes.map(({ index, width }) => ({ id: String(index), width, height: sizes.node })),
    edges: of.edges.map(({ from, to }, i) => ({
      id: `e${i}`,
      sources: [String(from)],
      targets: [String(to)],
    })),
  };
}

function placed(of: ComplexClass, sizes: Sizes, graph: ElkNode): PlacedClass {
  const at = new Map(graph.children?.map((child) => [child.id, child]));
  return {
    of,
    nodes: of.nodes.map((node) => {
      const { x = 0, y = 0 } = at.get(String(node.index)) ?? {};
      return { ...node, x, y, height: sizes.node };
    }),
    edges: of.edges.flatMap(({ from, to, both, label }, i) => {
      const section = graph.edges?.[i]?.sections?.[0];
      if (section === undefined) return [];
      const points = [section.startPoint, ...(section.bendPoints ?? []), section.endPoint];
      return { from, to, points, both, label };
    }),
    width: graph.width ?? 0,
    height: graph.height ?? 0,
  };
}

/** Places one linkage class: chains at once, everything else by the layout library, layered to the right. */
export async function layOutClass(
  of: ComplexClass,
  sizes: Sizes,
  layOut: LayOut = layOutAside,
): Promise<PlacedClass> {
  const chain = chainOf(of);
  if (chain !== null) return layOutChain(of, chain, sizes);
  let graph = await layOut(graphOf(of, sizes));
  // Shorter arrows before folding.
  const tight = { ...sizes, arrow: Math.round(sizes.arrow * 0.62) };
  if ((graph.width ?? 0) > sizes.width) graph = await layOut(graphOf(of, tight));
  // A class whose arrows come back, a ring above all, cannot be cut at one arrow: several are then led to the next line.
  for (const strategy of ['SINGLE_EDGE', 'MULTI_EDGE']) {
    for (const aspect of aspects) {
      if ((graph.width ?? 0) <= sizes.width) break;
      const folded = await layOut(
        graphOf(of, tight, {
          'elk.aspectRatio': aspect,
          'elk.layered.wrapping.strategy': strategy,
          'elk.layered.wrapping.additionalEdgeSpacing': '10',
        }),
      );
      if (strategy === 'SINGLE_EDGE' && folded.width === graph.width) break;
      // Many arrows led back are hard to read: taken only where the class then fits.
      const most = strategy === 'SINGLE_EDGE' ? (graph.width ?? 0) : sizes.width;
      if ((folded.width ?? 0) <= most) graph = folded;
    }
  }
  return placed(of, sizes, graph);
}
