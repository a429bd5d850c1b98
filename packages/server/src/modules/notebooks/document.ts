import { type NotebookContent, fillNotebook, origins, readNotebook } from '@stillroom/shared/document';
import * as Y from 'yjs';

/** The one thing asked of a database here: TypeORM's DataSource and EntityManager both have it. */
export interface Queries {
  query(sql: string, parameters?: unknown[]): Promise<unknown>;
}

/**
 * Fills a document with what is kept of a notebook. Snapshot and log are read in one statement: a compaction between
 * two would hide rows.
 * @returns how many updates stand in the log.
 */
export async function loadDocument(queries: Queries, notebook: string, doc: Y.Doc): Promise<number> {
  const rows = (await queries.query(
    `select 0 as place, state as bytes from notebook_snapshot where notebook = $1
     union all select 1, update from notebook_update where notebook = $1`,
    [notebook],
  )) as { place: number; bytes: Uint8Array }[];
  doc.transact(() => {
    for (const { bytes } of rows) Y.applyUpdate(doc, bytes);
  }, origins.server);
  return rows.filter(({ place }) => place === 1).length;
}

/** What is kept of a notebook, as plain data. */
export async function readContent(queries: Queries, notebook: string): Promise<NotebookContent> {
  const doc = new Y.Doc();
  try {
    await loadDocument(queries, notebook, doc);
    return readNotebook(doc);
  } finally {
    doc.destroy();
  }
}

/** Writes the first snapshot of a new notebook. */
export async function writeDocument(
  queries: Queries,
  notebook: string,
  content: NotebookContent,
): Promise<void> {
  const doc = new Y.Doc();
  fillNotebook(doc, content, origins.server);
  await queries.query('insert into notebook_snapshot (notebook, state) values ($1, $2)', [
    notebook,
    Buffer.from(Y.encodeStateAsUpdate(doc)),
  ]);
  doc.destroy();
}
