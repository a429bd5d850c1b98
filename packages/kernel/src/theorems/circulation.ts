/**
 * A positive integer flux on every arrow with inflow equal to outflow at each complex, for a weakly reversible graph:
 * the sum over all arrows y → y' of one cycle y → y' → root → y through a root of their class. Null where some arrow
 * lies on no cycle. Linear: flows along the two search trees are added up from the leaves.
 */
export function positiveCirculation(
  complexCount: number,
  arrows: readonly { readonly from: number; readonly to: number }[],
): bigint[] | null {
  const outgoing: number[][] = Array.from({ length: complexCount }, () => []);
  const incoming: number[][] = Array.from({ length: complexCount }, () => []);
  arrows.forEach(({ from, to }, arrow) => {
    outgoing[from]!.push(arrow);
    incoming[to]!.push(arrow);
  });
  const away = searchTree(complexCount, outgoing, (arrow) => arrows[arrow]!.to);
  const home = searchTree(complexCount, incoming, (arrow) => arrows[arrow]!.from);
  if (arrows.some(({ from, to }) => away.root[from] !== home.root[to] || away.root[to] !== home.root[from]))
    return null;
  const flux = new Float64Array(arrows.length).fill(1);
  const reach = new Float64Array(complexCount);
  const leave = new Float64Array(complexCount);
  for (const { from, to } of arrows) {
    reach[from]!++;
    leave[to]!++;
  }
  addAlongTree(away, reach, flux, (arrow) => arrows[arrow]!.from);
  addAlongTree(home, leave, flux, (arrow) => arrows[arrow]!.to);
  return Array.from(flux, BigInt);
}

interface SearchTree {
  readonly root: Int32Array;
  /** The arrow that joins a complex to the tree, or -1 at a root. */
  readonly via: Int32Array;
  /** Complexes in the order of discovery. */
  readonly order: number[];
}

function searchTree(count: number, leaving: readonly number[][], end: (arrow: number) => number): SearchTree {
  const root = new Int32Array(count).fill(-1);
  const via = new Int32Array(count).fill(-1);
  const order: number[] = [];
  for (let start = 0; start < count; start++) {
    if (root[start] !== -1) continue;
    root[start] = start;
    order.push(start);
    for (let head = order.length - 1; head < order.length; head++) {
      for (const arrow of leaving[order[head]!]!) {
        const next = end(arrow);
        if (root[next] !== -1) continue;
        root[next] = start;
        via[next] = arrow;
        order.push(next);
      }
    }
  }
  return { root, via, order };
}

function addAlongTree(
  tree: SearchTree,
  through: Float64Array,
  flux: Float64Array,
  parent: (arrow: number) => number,
): void {
  for (let k = tree.order.length - 1; k >= 0; k--) {
    const complex = tree.order[k]!;
    const arrow = tree.via[complex]!;
    if (arrow < 0) continue;
    flux[arrow]! += through[complex]!;
    through[parent(arrow)]! += through[complex]!;
  }
}
