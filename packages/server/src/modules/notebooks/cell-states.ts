import type { ClaimVerdict } from '@stillroom/shared/cells';
import type { NotebookContent } from '@stillroom/shared/document';
import type { CellError, CellState } from '@stillroom/shared/protocol';
import type { Queries } from './document.ts';
import { openingOf } from './opening.ts';
import { storableJson, storableText } from '../../database/storable.ts';

/** The last known state of a cell, for the Shelf and for whoever opens the notebook next. */
export interface CellStanding {
  readonly cell: string;
  /** Place in the notebook, from 0. */
  readonly place: number;
  readonly kind: string;
  readonly name: string;
  readonly state: CellState;
  readonly digest: string | null;
  /** Digest of its last good result. */
  readonly shown: string | null;
  readonly error: CellError | null;
  /** Of a claim that has been judged. */
  readonly verdict: ClaimVerdict | null;
}

/** The last known states of a notebook's cells, in order. */
export async function readStates(queries: Queries, notebook: string): Promise<CellStanding[]> {
  return (await queries.query(
    `select cell, place, kind, name, state, digest, shown, error, verdict
     from notebook_cell where notebook = $1 order by place`,
    [notebook],
  )) as CellStanding[];
}

/** The group a notebook belongs to. */
export async function readGroup(queries: Queries, notebook: string): Promise<string> {
  const [row] = (await queries.query('select "group" from notebook where id = $1', [notebook])) as {
    group: string;
  }[];
  if (row === undefined) throw new Error(`There is no notebook ${notebook}.`);
  return row.group;
}

/** Notebooks in which a cell was working when last heard of. */
export async function workingNotebooks(queries: Queries): Promise<string[]> {
  const rows = (await queries.query(
    `select distinct notebook from notebook_cell c join notebook n on n.id = c.notebook
     where c.state = 'working' and n.deleted_at is null`,
  )) as { notebook: string }[];
  return rows.map(({ notebook }) => notebook);
}

/** Keeps the states of all cells of a notebook, in place of those kept before. */
export async function keepStates(
  queries: Queries,
  notebook: string,
  states: readonly CellStanding[],
): Promise<void> {
  await queries.query(
    `with new as (
       select * from jsonb_to_recordset($2::jsonb) as cell (cell text, place integer, kind text, name text, state text,
         digest text, shown text, error jsonb, verdict text)
     ), gone as (
       delete from notebook_cell where notebook = $1 and cell not in (select cell from new)
     )
     insert into notebook_cell (notebook, cell, place, kind, name, state, digest, shown, error, verdict)
     select $1, cell, place, kind, name, state, digest, shown, error, verdict from new
     where exists (select from notebook where id = $1)
     on conflict (notebook, cell) do update set place = excluded.place, kind = excluded.kind, name = excluded.name,
       state = excluded.state, digest = excluded.digest, shown = excluded.shown, error = excluded.error,
       verdict = excluded.verdict`,
    [notebook, storableJson(states)],
  );
}

/** Copies what the Shelf shows of a document: title, subject, first words. */
export async function keepFace(queries: Queries, notebook: string, content: NotebookContent): Promise<void> {
  await queries.query(
    `update notebook set title = $2, subject = $3, opening = $4
     where id = $1 and (title, subject, opening) is distinct from ($2, $3, $4)`,
    [notebook, storableText(content.title), content.subject, storableText(openingOf(content))],
  );
}
