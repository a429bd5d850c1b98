import type { CellContent } from '@stillroom/shared/document';
import type { ElkNode } from 'elkjs/lib/elk-api.js';
import { layOut } from '../../graph/elk.ts';
import type { Point } from '../../graph/geometry.ts';
import { kindNames } from '../notebook/kindNames.ts';
import { headingOf } from '../notebook/numbering.ts';

/** A cell on the plan, with its place once laid out. */
export interface PlanNode {
  readonly id: string;
  readonly title: string;
  readonly kind: string;
  readonly x: number;
  readonly y: number;
  readonly width: number;
}

/** `to` draws on `from`. */
export interface PlanEdge {
  readonly from: string;
  readonly to: string;
  readonly points: readonly Point[];
}

export interface PlanDrawing {
  readonly nodes: readonly PlanNode[];
  readonly edges: readonly PlanEdge[];
  readonly width: number;
  readonly height: number;
}

/** Height of a cell on the plan, in pixels. */
export const nodeHeight = 38;

const options: Readonly<Record<string, string>> = {
  'elk.algorithm': 'layered',
  'elk.direction': 'RIGHT',
  'elk.layered.spacing.nodeNodeBetweenLayers': '62',
  'elk.spacing.nodeNode': '11',
  'elk.layered.spacing.edgeNodeBetweenLayers': '14',
  'elk.spacing.edgeNode': '9',
  'elk.spacing.edgeEdge': '7',
  'elk.edgeRouting': 'ORTHOGONAL',
  'elk.layered.crossingMinimization.strategy': 'LAYER_SWEEP',
  'elk.layered.nodePlacement.strategy': 'BRANDES_KOEPF',
  'elk.layered.thoroughness': '60',
  'elk.separateConnectedComponents': 'false',
};

/** What a cell is called on the plan: its name, or the heading of prose. */
export const titleOf = (cell: CellContent): string =>
  cell.kind === 'prose' ? headingOf(cell.text) : cell.name;

const widthOf = (title: string, kind: string) =>
  Math.max(96, title.length * 7.4 + 40, kind.length * 6.4 + 44);

/** Lays out the cells so that what is drawn on stands left, with right-angled lines. */
export async function drawPlan(
  cells: readonly CellContent[],
  drawsOf: (id: string) => readonly string[],
): Promise<PlanDrawing> {
  const shown = new Set(cells.map(({ id }) => id));
  const nodes = cells.map((cell) => {
    const title = titleOf(cell);
    const kind = kindNames[cell.kind];
    return { id: cell.id, title, kind, width: widthOf(title, kind) };
  });
  const edges = cells.flatMap(({ id }) =>
    drawsOf(id)
      .filter((source) => shown.has(source))
      .map((from) => ({ from, to: id })),
  );
  const graph: ElkNode = {
    id: 'plan',
    layoutOptions: options,
    children: nodes.map(({ id, width }) => ({ id, width, height: nodeHeight })),
    edges: edges.map(({ from, to }, i) => ({ id: `e${i}`, sources: [from], targets: [to] })),
  };
  const placed = await layOut(graph);
  const at = new Map(placed.children?.map((child) => [child.id, child]));
  return {
    nodes: nodes.map((node) => ({ ...node, x: at.get(node.id)?.x ?? 0, y: at.get(node.id)?.y ?? 0 })),
    edges: edges.map(({ from, to }, i) => {
      const section = placed.edges?.[i]?.sections?.[0];
      const points =
        section === undefined ? [] : [section.startPoint, ...(section.bendPoints ?? []), section.endPoint];
      return { from, to, points };
    }),
    width: placed.width ?? 0,
    height: placed.height ?? 0,
  };
}

/** All cells reached from one by following a relation. */
export function reached(begin: string, next: (id: string) => readonly string[]): ReadonlySet<string> {
  const found = new Set<string>();
  const queue = [begin];
  for (let id = queue.pop(); id !== undefined; id = queue.pop())
    for (const following of next(id))
      if (!found.has(following)) {
        found.add(following);
        queue.push(following);
      }
  return found;
}
