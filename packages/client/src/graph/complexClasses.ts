import { complexLabel } from '../components/results/terms.ts';
import type { StructureResult } from '../components/results/shapes.ts';

export interface ComplexNode {
  readonly index: number;
  readonly label: string;
  readonly width: number;
  readonly terminal: boolean;
}

/** One line between two complexes; `both` where arrows go both ways. */
export interface ComplexEdge {
  readonly from: number;
  readonly to: number;
  readonly both: boolean;
  readonly label: string;
}

export interface ComplexClass {
  /** 1-based, as it is named on the page. */
  readonly number: number;
  readonly nodes: readonly ComplexNode[];
  readonly edges: readonly ComplexEdge[];
  /** Terminal strong linkage classes, as indices of complexes. */
  readonly terminal: readonly (readonly number[])[];
  /** Null where the network is too large for a proof. */
  readonly rank: number | null;
  readonly deficiency: number | null;
}

/** From this many complexes on the graph is set smaller and an outline stands beside it. */
export const manyComplexes = 24;

/** Above this many complexes the classes start folded to a name and a count. */
export const foldedAbove = 200;

/** A class of more complexes than this is not drawn; the table has it. */
export const drawnAtMost = 400;

let ruler: CanvasRenderingContext2D | null | undefined;

/** Width of a label in the serif of the page, in pixels. */
export function labelWidth(label: string, size: number): number {
  ruler ??= document.createElement('canvas').getContext('2d');
  if (ruler === null) return label.length * size * 0.5;
  ruler.font = `400 ${size}px "Gentium Book Plus", Georgia, serif`;
  return ruler.measureText(label).width;
}

/**
 * The linkage classes of a structure, ready to be drawn; reversible pairs are one line. Given `only`, those alone, by
 * 0-based index.
 */
export function complexClasses(
  structure: StructureResult,
  size: number,
  only: ReadonlySet<number> | null = null,
): readonly ComplexClass[] {
  const { complexes = [], reactions = [], linkageClasses = [], terminalStrongClasses = [] } = structure;
  const terminal = new Set(terminalStrongClasses.flat());
  const classOf = new Map(linkageClasses.flatMap(({ complexes: members }, i) => members.map((m) => [m, i])));
  const edges = linkageClasses.map(() => new Map<string, ComplexEdge>());
  for (const { from, to, row, reverse } of reactions) {
    const ofClass = edges[classOf.get(from) ?? -1];
    const back = ofClass?.get(`${to} ${from}`);
    if (ofClass === undefined || back !== undefined) continue;
    // Equal rows state one arrow.
    const stated = ofClass.get(`${from} ${to}`);
    const label = stated === undefined ? `R${row + 1}` : `${stated.label}, R${row + 1}`;
    ofClass.set(`${from} ${to}`, { from, to, both: reverse !== null, label });
  }
  return linkageClasses.flatMap((linkage, i) => {
    if (only !== null && !only.has(i)) return [];
    const nodes = linkage.complexes.map((index) => {
      const label = complexLabel(complexes[index]?.of ?? {});
      return { index, label, width: Math.ceil(labelWidth(label, size)) + 16, terminal: terminal.has(index) };
    });
    return {
      number: i + 1,
      nodes,
      edges: [...(edges[i]?.values() ?? [])],
      terminal: terminalStrongClasses.filter(([first]) => first !== undefined && classOf.get(first) === i),
      rank: linkage.rank,
      deficiency: linkage.deficiency,
    };
  });
}
