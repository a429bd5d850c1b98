import type { PlacedClass } from './chainLayout.ts';

/** A class with the place of its corner on the page. */
export interface PackedClass extends PlacedClass {
  readonly x: number;
  readonly y: number;
}

export interface PackedGraph {
  readonly classes: readonly PackedClass[];
  readonly width: number;
  readonly height: number;
}

const apart = 14;
const betweenLines = 22;
const headHeight = 18;

/** Packs classes in lines like words, largest first; each has room for its name above. */
export function packClasses(placed: readonly PlacedClass[], width: number, headWidth: number): PackedGraph {
  const sorted = [...placed].sort((a, b) => b.nodes.length - a.nodes.length || b.width - a.width);
  const classes: PackedClass[] = [];
  let x = 0;
  let y = 0;
  let lineHeight = 0;
  let widest = width;
  for (const one of sorted) {
    const taken = Math.max(one.width, headWidth);
    if (x > 0 && x + taken > width) {
      x = 0;
      y += lineHeight + betweenLines;
      lineHeight = 0;
    }
    classes.push({ ...one, x, y: y + headHeight });
    x += taken + apart;
    lineHeight = Math.max(lineHeight, one.height + headHeight);
    widest = Math.max(widest, one.width);
  }
  return { classes, width: widest, height: y + lineHeight + 4 };
}
