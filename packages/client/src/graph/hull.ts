import type { PlacedClass, PlacedNode } from './chainLayout.ts';

export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

const margin = 3;

function around(nodes: readonly PlacedNode[]): Box {
  const left = Math.min(...nodes.map(({ x }) => x)) - margin;
  const top = Math.min(...nodes.map(({ y }) => y)) - margin;
  const right = Math.max(...nodes.map(({ x, width }) => x + width)) + margin;
  const bottom = Math.max(...nodes.map(({ y, height }) => y + height)) + margin;
  return { x: left, y: top, width: right - left, height: bottom - top };
}

const overlaps = (box: Box, node: PlacedNode) =>
  node.x < box.x + box.width &&
  node.x + node.width > box.x &&
  node.y < box.y + box.height &&
  node.y + node.height > box.y;

/** A larger terminal class is ringed complex by complex: one ground for all of it would say nothing. */
const together = 6;

/** Grounds of the terminal strong classes: one for the whole where nothing else stands in it, else one a complex. */
export function terminalGrounds({ of, nodes }: PlacedClass): readonly Box[] {
  return of.terminal.flatMap((members) => {
    const inside = nodes.filter(({ index }) => members.includes(index));
    if (inside.length === 0) return [];
    const whole = around(inside);
    const alone = nodes.every((node) => members.includes(node.index) || !overlaps(whole, node));
    return alone && inside.length <= together ? [whole] : inside.map((node) => around([node]));
  });
}
