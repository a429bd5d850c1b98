/** What a set of cells looks like as a graph of draws. */
export interface DrawGraph {
  /** Every id, each after the ids it draws on. */
  readonly order: readonly string[];
  /** For an id that lies on a circle: the ids of that circle in the order in which they draw on each other. */
  readonly circles: ReadonlyMap<string, readonly string[]>;
}

/**
 * Strongly connected components by Tarjan (1972, SIAM J. Comput. 1:146), which come out in the order asked for. The
 * walk is recursive: a notebook has at most a thousand cells.
 *
 * @param ids in document order, which decides among cells that do not depend on each other
 */
export function drawGraph(ids: readonly string[], drawsOf: (id: string) => readonly string[]): DrawGraph {
  const indices = new Map<string, number>();
  const low = new Map<string, number>();
  const stack: string[] = [];
  const onStack = new Set<string>();
  const order: string[] = [];
  const circles = new Map<string, readonly string[]>();

  const visit = (id: string): number => {
    const index = indices.size;
    indices.set(id, index);
    stack.push(id);
    onStack.add(id);
    let lowest = index;
    for (const next of drawsOf(id)) {
      if (!indices.has(next)) lowest = Math.min(lowest, visit(next));
      else if (onStack.has(next)) lowest = Math.min(lowest, indices.get(next) ?? index);
    }
    low.set(id, lowest);
    if (lowest === index) {
      const component = stack.splice(stack.indexOf(id));
      component.forEach((member) => onStack.delete(member));
      order.push(...component.toReversed());
      if (component.length > 1 || drawsOf(id).includes(id)) {
        component.forEach((member) =>
          circles.set(member, circleThrough(member, new Set(component), drawsOf)),
        );
      }
    }
    return lowest;
  };
  for (const id of ids) if (!indices.has(id)) visit(id);
  return { order, circles };
}

/** A shortest circle through `start` within its component. */
function circleThrough(
  start: string,
  component: ReadonlySet<string>,
  drawsOf: (id: string) => readonly string[],
): string[] {
  const cameFrom = new Map<string, string>();
  const queue = [start];
  for (const id of queue) {
    for (const next of drawsOf(id)) {
      if (next === start) {
        const circle = [id];
        for (let at = id; at !== start;) {
          at = cameFrom.get(at) ?? start;
          circle.push(at);
        }
        return circle.toReversed();
      }
      if (component.has(next) && !cameFrom.has(next)) {
        cameFrom.set(next, id);
        queue.push(next);
      }
    }
  }
  return [start];
}
