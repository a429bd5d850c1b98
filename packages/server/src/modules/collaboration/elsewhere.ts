import { loadDocument, type Queries } from '../notebooks/index.ts';
import type { Room } from './room.ts';
import * as Y from 'yjs';

/** News of updates that a process has kept; ids are those of the log. */
export interface KeptElsewhere {
  /** The process. */
  readonly from: string;
  readonly notebook: string;
  readonly first: string;
  readonly last: string;
  readonly rows: number;
}

/**
 * Brings updates that another process has kept into a room of this one. Where a compaction has taken the rows away
 * meanwhile, all that is kept is read again: what is known changes nothing.
 */
export async function takeInKept(queries: Queries, room: Room, news: KeptElsewhere): Promise<void> {
  const rows = (await queries.query(
    'select update from notebook_update where notebook = $1 and id between $2 and $3 order by id',
    [news.notebook, news.first, news.last],
  )) as { update: Uint8Array }[];
  if (rows.length >= news.rows) room.takeIn(rows.map(({ update }) => update));
  else await takeInAll(queries, room);
}

/** Brings everything kept into a room, as after a time without news. */
export async function takeInAll(queries: Queries, room: Room): Promise<void> {
  const kept = new Y.Doc();
  await loadDocument(queries, room.notebook, kept);
  room.takeIn([Y.encodeStateAsUpdate(kept, Y.encodeStateVector(room.doc))]);
  kept.destroy();
}
