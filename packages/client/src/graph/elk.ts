import type { ELK, ElkNode } from 'elkjs/lib/elk-api.js';
import workerUrl from 'elkjs/lib/elk-worker.min.js?url';

let engine: Promise<ELK> | null = null;

/** The layout library in a worker of its own, fetched when a drawing first needs it. */
async function elk(): Promise<ELK> {
  engine ??= import('elkjs/lib/elk-api.js').then(
    ({ default: Elk }) => new Elk({ workerFactory: () => new Worker(workerUrl) }),
  );
  return engine;
}

/** Places the nodes and edges of a graph; sizes in pixels. */
export async function layOut(graph: ElkNode): Promise<ElkNode> {
  return (await elk()).layout(graph);
}
