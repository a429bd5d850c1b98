import type { ShelfRow } from '@stillroom/shared/contracts';
import type { GroupRole } from '@stillroom/shared/roles';
import type { EntityManager } from 'typeorm';
import { findPeople, presentPerson } from '../auth/index.ts';
import type { RoomStore } from '../collaboration/index.ts';

/** A notebook that a person may see, as the Shelf reads it. */
export interface ShelvedNotebook {
  readonly id: string;
  readonly title: string;
  readonly opening: string;
  readonly groupId: string;
  readonly groupName: string;
  readonly groupHue: number;
  readonly role: GroupRole;
  readonly workedAt: Date;
  readonly workedBy: string | null;
  readonly deletedAt: Date | null;
}

/** Every notebook a person may see over all groups, the one worked in last first. The log is newer than the notebook's own line. */
export function shelvedNotebooks(manager: EntityManager, person: string): Promise<ShelvedNotebook[]> {
  return manager.query(
    `select n.id, n.title, n.opening, g.id as "groupId", g.name as "groupName", g.hue as "groupHue", m.role,
       coalesce(latest.at, n.last_work_at) as "workedAt",
       case when latest.at is null then n.last_work_by else latest.person end as "workedBy",
       n.deleted_at as "deletedAt"
     from membership m
       join work_group g on g.id = m."group"
       join notebook n on n."group" = g.id and (m.notebooks is null or n.id = any(m.notebooks))
       left join lateral (
         select at, person from notebook_update u where u.notebook = n.id order by u.id desc limit 1
       ) latest on true
     where m.person = $1
     order by 8 desc`,
    [person],
  );
}

interface CellLine {
  readonly notebook: string;
  readonly kind: string;
  readonly state: ShelfRow['seam'][number];
  readonly verdict: 'holds' | 'fails' | 'undecided' | null;
}

/** The notebooks as lines of the Shelf: how their cells stand, who is there now. */
export async function presentRows(
  manager: EntityManager,
  rooms: RoomStore,
  notebooks: readonly ShelvedNotebook[],
): Promise<ShelfRow[]> {
  const ids = notebooks.map(({ id }) => id);
  const lines: CellLine[] = await manager.query(
    'select notebook, kind, state, verdict from notebook_cell where notebook = any($1) order by notebook, place',
    [ids],
  );
  const here = await rooms.peopleAt(ids);
  const people = await findPeople(manager, [
    ...notebooks.flatMap(({ workedBy }) => workedBy ?? []),
    ...[...here.values()].flat(),
  ]);
  const cells = new Map<string, CellLine[]>(ids.map((id) => [id, []]));
  for (const line of lines) cells.get(line.notebook)?.push(line);
  return notebooks.map((notebook) => {
    const own = cells.get(notebook.id) ?? [];
    const worker = notebook.workedBy === null ? undefined : people.get(notebook.workedBy);
    return {
      id: notebook.id,
      title: notebook.title,
      opening: notebook.opening,
      group: { id: notebook.groupId, name: notebook.groupName, hue: notebook.groupHue },
      role: notebook.role,
      seam: own.map(({ kind, state }) => (kind === 'prose' && state !== 'failed' ? 'prose' : state)),
      claims: countClaims(own),
      people: (here.get(notebook.id) ?? []).flatMap((id) => {
        const person = people.get(id);
        return person === undefined ? [] : [presentPerson(person)];
      }),
      lastWork: {
        at: notebook.workedAt.toISOString(),
        by: worker === undefined ? null : presentPerson(worker),
      },
      deletedAt: notebook.deletedAt?.toISOString() ?? null,
    };
  });
}

/** A claim that has not been judged, or cannot be, is undecided. */
function countClaims(cells: readonly CellLine[]): ShelfRow['claims'] {
  const claims = { holds: 0, fails: 0, undecided: 0 };
  for (const { kind, verdict } of cells) if (kind === 'claim') claims[verdict ?? 'undecided'] += 1;
  return claims;
}
