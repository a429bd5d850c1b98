import type { EntityManager } from 'typeorm';
import { notFound } from '../../../errors.ts';
import { readRecordContent } from '../../records/index.ts';
import { RerunCellEntity, RerunEntity } from '../entities/rerun.ts';
import type { OpenedReview } from '../load.ts';

/** Name of the task in the queue. */
export const rerunTask = 'rerun';

/** What the task is given. */
export interface RerunTask {
  readonly rerun: string;
}

/**
 * Queues a rerun of a record, or of one of its cells. One that is under way for this review is given back instead.
 * @throws not-found where the record has no such cell.
 */
export async function beginRerun(
  manager: EntityManager,
  { review, record }: OpenedReview,
  cell: string | null,
): Promise<RerunEntity> {
  await manager.query('select 1 from review where id = $1 for update', [review.id]);
  const underway = await manager
    .createQueryBuilder(RerunEntity, 'rerun')
    .where('rerun.review = :review and rerun.done_at is null', { review: review.id })
    .getOne();
  if (underway !== null) return underway;
  const { cells } = await readRecordContent(manager, record.id);
  const asked = cells.filter(({ id }) => cell === null || id === cell);
  if (asked.length === 0) throw notFound('cell in this record');
  const made = await manager.save(manager.create(RerunEntity, { review: review.id, cell }));
  await manager.insert(
    RerunCellEntity,
    asked.map(({ id }) => ({ rerun: made.id, cell: id, outcome: 'waiting' as const })),
  );
  const task: RerunTask = { rerun: made.id };
  await manager.query(`select graphile_worker.add_job($1, $2::json, max_attempts := 1)`, [
    rerunTask,
    JSON.stringify(task),
  ]);
  return manager.findOneByOrFail(RerunEntity, { id: made.id });
}
