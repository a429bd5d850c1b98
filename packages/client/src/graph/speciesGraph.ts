import type { ElkNode } from 'elkjs/lib/elk-api.js';
import { complexLabel } from '../components/results/terms.ts';
import type { StructureResult } from '../components/results/shapes.ts';
import type { LayOut } from './classLayout.ts';
import type { Point } from './geometry.ts';

/** A species, or a reaction (both ways together where it has a way back). */
export interface SpeciesGraphNode {
  readonly id: string;
  readonly label: string;
  /** Name of the species; absent for a reaction. */
  readonly species?: string;
  /** Indices of the reactions it stands for: the first, and its way back. */
  readonly reactions: readonly number[];
  /** The reaction in words. */
  readonly title: string;
}

/** A species enters a reaction, or leaves it; `both` where it goes in and out by one line of a reversible reaction. */
export interface SpeciesGraphEdge {
  readonly from: string;
  readonly to: string;
  /** Molecules, where more than one. */
  readonly label: string;
  readonly both: boolean;
}

export interface SpeciesGraph {
  readonly nodes: readonly SpeciesGraphNode[];
  readonly edges: readonly SpeciesGraphEdge[];
}

/** Above this many nodes the picture gives way to the table. */
export const speciesGraphAtMost = 160;

/** How many nodes the species–reaction graph would have at most. */
export const speciesGraphSize = ({ counts }: StructureResult): number => counts.species + counts.reactions;

const many = (count: number | string | undefined) =>
  count === undefined || String(count) === '1' ? '' : String(count);

/** The species–reaction graph: an arrow from each reactant to the reaction and from the reaction to each product. */
export function speciesGraph(structure: StructureResult): SpeciesGraph {
  const { species = [], complexes = [], reactions = [] } = structure;
  const nodes: SpeciesGraphNode[] = species.map((name) => ({
    id: `s:${name}`,
    label: name,
    species: name,
    reactions: [],
    title: name,
  }));
  const edges: SpeciesGraphEdge[] = [];
  reactions.forEach(({ row, from, to, reverse }, i) => {
    const back = reverse !== null && (reactions[reverse]?.row ?? -1) === row ? reverse : null;
    if (back !== null && back < i) return;
    const reactants = complexes[from]?.of ?? {};
    const products = complexes[to]?.of ?? {};
    const id = `r:${i}`;
    const both = back !== null;
    nodes.push({
      id,
      label: `R${row + 1}`,
      reactions: back === null ? [i] : [i, back],
      title: `${complexLabel(reactants)} ${both ? '⇌' : '→'} ${complexLabel(products)}`,
    });
    for (const [name, count] of Object.entries(reactants))
      edges.push({ from: `s:${name}`, to: id, label: many(count), both });
    for (const [name, count] of Object.entries(products))
      edges.push({ from: id, to: `s:${name}`, label: many(count), both });
  });
  return { nodes, edges };
}

export interface PlacedSpeciesNode extends SpeciesGraphNode {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

export interface PlacedSpeciesGraph {
  readonly nodes: readonly PlacedSpeciesNode[];
  readonly edges: readonly (SpeciesGraphEdge & { readonly points: readonly Point[] })[];
  readonly width: number;
  readonly height: number;
}

/**
 * Places the species–reaction graph, its parts packed on the page: flowing right where that fits `width`, else
 * downwards. `widthOf` measures a label in pixels.
 */
export async function layOutSpecies(
  graph: SpeciesGraph,
  width: number,
  widthOf: (label: string) => number,
  layOut: LayOut,
): Promise<PlacedSpeciesGraph> {
  const sizes = new Map(
    graph.nodes.map(({ id, label, species }) => [
      id,
      species === undefined
        ? { width: 12 + 7.5 * label.length, height: 24 }
        : { width: Math.ceil(widthOf(label)) + 14, height: 24 },
    ]),
  );
  const flowing = (direction: 'RIGHT' | 'DOWN'): ElkNode => ({
    id: 'species and reactions',
    layoutOptions: {
      'elk.algorithm': 'layered',
      'elk.direction': direction,
      'elk.edgeRouting': 'POLYLINE',
      'elk.spacing.nodeNode': '14',
      'elk.spacing.edgeNode': '10',
      'elk.spacing.edgeEdge': '14',
      'elk.spacing.componentComponent': '22',
      'elk.layered.spacing.nodeNodeBetweenLayers': '30',
      'elk.layered.thoroughness': '20',
      'elk.aspectRatio': '2.4',
      'elk.padding': '[top=4,left=2,bottom=4,right=2]',
    },
    children: graph.nodes.map(({ id }) => ({ id, ...sizes.get(id) })),
    edges: graph.edges.map(({ from, to }, i) => ({ id: `e${i}`, sources: [from], targets: [to] })),
  });
  let placed = await layOut(flowing('RIGHT'));
  if ((placed.width ?? 0) > width) {
    const down = await layOut(flowing('DOWN'));
    if ((down.width ?? 0) < (placed.width ?? 0)) placed = down;
  }
  const at = new Map(placed.children?.map((child) => [child.id, child]));
  return {
    nodes: graph.nodes.map((node) => {
      const { x = 0, y = 0 } = at.get(node.id) ?? {};
      return { ...node, x, y, ...(sizes.get(node.id) ?? { width: 0, height: 0 }) };
    }),
    edges: graph.edges.flatMap((edge, i) => {
      const section = placed.edges?.[i]?.sections?.[0];
      if (section === undefined) return [];
      return { ...edge, points: [section.startPoint, ...(section.bendPoints ?? []), section.endPoint] };
    }),
    width: placed.width ?? 0,
    height: placed.height ?? 0,
  };
}
