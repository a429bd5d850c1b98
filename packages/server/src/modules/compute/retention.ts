import { makeWorkerUtils } from 'graphile-worker';
import type { Connections } from '../../database/connections.ts';

/** Days for which a result that no notebook shows any more is kept: long enough to come back to by undoing. */
const resultDays = 60;
/** Days for which the end of a run that was stopped is remembered. */
const attemptDays = 30;

/**
 * Takes away results that no notebook shows and that are old: a record holds its own. What comes up again is computed
 * again. Also takes away what the queue remembers of runs that were taken from it.
 */
export async function takeOutOldResults(connections: Connections): Promise<void> {
  await connections.query(
    `delete from cell_result r where at < now() - make_interval(days => $1)
       and not exists (select from notebook_cell c where c.digest = r.digest or c.shown = r.digest)`,
    [resultDays],
  );
  await connections.query('delete from cell_attempt where at < now() - make_interval(days => $1)', [
    attemptDays,
  ]);
  const queue = await makeWorkerUtils({ pgPool: connections.pool });
  await queue.cleanup({ tasks: ['DELETE_PERMAFAILED_JOBS'] });
  await queue.release();
}
