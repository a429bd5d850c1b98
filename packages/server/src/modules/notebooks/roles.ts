import { type GroupRole, roleAt } from '@stillroom/shared/roles';
import type { Queries } from './document.ts';

/** The role that counts for a person at a notebook now; null is none, 'gone' a notebook that is not there or in the bin. */
export async function readRole(
  queries: Queries,
  person: string,
  notebook: string,
): Promise<GroupRole | 'gone' | null> {
  const [row] = (await queries.query(
    `select n.deleted_at is not null as binned, m.role, m.notebooks
     from notebook n left join membership m on m."group" = n."group" and m.person = $1
     where n.id = $2`,
    [person, notebook],
  )) as { binned: boolean; role: GroupRole | null; notebooks: string[] | null }[];
  if (row === undefined || row.binned) return 'gone';
  return row.role === null ? null : roleAt({ role: row.role, notebooks: row.notebooks }, notebook);
}
