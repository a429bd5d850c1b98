import type { QueueView } from '@stillroom/shared/contracts';
import type { Queries } from '../notebooks/index.ts';
import type { Pool } from './pool/index.ts';

/** The queue as the operator sees it: workers of this process, runs of all, and each group's use of today. */
export async function readQueue(queries: Queries, pool: Pool | null): Promise<QueueView> {
  const groups = (await queries.query(
    `select g.name,
       count(r.digest) filter (where r.started_at is null)::int as waiting,
       count(r.digest) filter (where r.started_at is not null)::int as running,
       coalesce(max(u.seconds), 0) as "secondsToday"
     from work_group g
       left join cell_run r on r."group" = g.id
       left join compute_use u on u."group" = g.id and u.day = current_date
     group by g.id, g.name
     having count(r.digest) > 0 or max(u.seconds) > 0
     order by g.name`,
  )) as QueueView['groups'];
  const isolation = pool?.isolation ?? '';
  return {
    workers: (pool?.workers() ?? []).map(({ id, state, kind, since }) => ({
      id,
      state,
      kind,
      since,
      isolation,
    })),
    waiting: groups.reduce((sum, group) => sum + group.waiting, 0),
    running: groups.reduce((sum, group) => sum + group.running, 0),
    groups,
  };
}
