export interface Point {
  readonly x: number;
  readonly y: number;
}

/** A polyline as path data. */
export const pathOf = (points: readonly Point[]): string =>
  points.map(({ x, y }, i) => `${i === 0 ? 'M' : 'L'}${x.toFixed(1)} ${y.toFixed(1)}`).join('');

const between = (a: Point, b: Point) => Math.hypot(b.x - a.x, b.y - a.y) || 1;

/**
 * A polyline moved sideways by `distance` (to its right where positive) and ended in a half barb: one of the two lines
 * of an arrow that goes both ways.
 */
export function halfArrow(points: readonly Point[], distance: number): string {
  const moved = points.map((point, i) => {
    const a = points[Math.max(0, i - 1)] ?? point;
    const b = points[Math.min(points.length - 1, i + 1)] ?? point;
    const length = between(a, b);
    return {
      x: point.x - ((b.y - a.y) / length) * distance,
      y: point.y + ((b.x - a.x) / length) * distance,
      nx: -(b.y - a.y) / length,
      ny: (b.x - a.x) / length,
    };
  });
  const end = moved.at(-1);
  const before = moved.at(-2);
  if (end === undefined || before === undefined) return '';
  const length = between(before, end);
  const side = Math.sign(distance);
  const dx = (-(end.x - before.x) / length) * 7 + end.nx * side * 3.8;
  const dy = (-(end.y - before.y) / length) * 7 + end.ny * side * 3.8;
  return `${pathOf(moved)}l${dx.toFixed(1)} ${dy.toFixed(1)}`;
}

/** The point half way along a polyline, or at another share of its length. */
export function middle(points: readonly Point[], share = 0.5): Point {
  const total = points.slice(1).reduce((sum, point, i) => sum + between(points[i] ?? point, point), 0);
  let left = total * share;
  for (let i = 1; i < points.length; i++) {
    const a = points[i - 1];
    const b = points[i];
    if (a === undefined || b === undefined) continue;
    const length = between(a, b);
    if (left <= length) {
      const part = left / length;
      return { x: a.x + (b.x - a.x) * part, y: a.y + (b.y - a.y) * part };
    }
    left -= length;
  }
  return points[0] ?? { x: 0, y: 0 };
}
