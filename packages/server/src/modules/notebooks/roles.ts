import { type GroupRole, roleAt } from '@stillroom/shared/roles';
import type { Queries } from './document.ts';

interface Row {
  readonly binned: boolean;
  readonly role: GroupRole | null;
  readonly notebooks: string[] | null;
}

/**
 * The roles that count for people at notebooks now, in the order asked for; null is none, 'gone' a notebook that is not
 * there or in the bin.
 */
export async function readRoles(
  queries: Queries,
  places: readonly { readonly person: string; readonly notebook: string }[],
): Promise<(GroupRole | 'gone' | null)[]> {
  const rows = (await queries.query(
    `select n.id is null or n.deleted_at is not null as binned, m.role, m.notebooks
     from unnest($1::uuid[], $2::uuid[]) with ordinality as place (person, notebook, number)
       left join notebook n on n.id = place.notebook
       left join membership m on m.person = place.person and m."group" = n."group"
     order by place.number`,
    [places.map(({ person }) => person), places.map(({ notebook }) => notebook)],
  )) as Row[];
  return places.map(({ notebook }, index) => {
    const row = rows[index];
    if (row === undefined || row.binned) return 'gone';
    return row.role === null ? null : roleAt({ role: row.role, notebooks: row.notebooks }, notebook);
  });
}
