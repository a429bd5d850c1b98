import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { conflict } from '../../../errors.ts';
import { recordAudit } from '../../groups/index.ts';
import { NotebookEntity } from '../entities/notebook.ts';

/** Days a notebook stays in the bin. */
export const binDays = 30;

/** Puts a notebook into the bin: nobody can open it, and its public copy closes. Records frozen from it stay. */
export async function deleteNotebook(
  manager: EntityManager,
  by: string,
  notebook: NotebookEntity,
): Promise<void> {
  const { id, group, title } = notebook;
  await manager.update(NotebookEntity, { id }, { deletedAt: new Date(), deletedBy: by });
  const words = `put the notebook “${title}” into the bin`;
  await recordAudit(manager, { group, by, verb: 'notebook.deleted', words });
  await announce(manager, 'notebook.changed', { notebook: id });
}

/**
 * Takes a notebook out of the bin, as it was.
 * @throws conflict where it is not in there.
 */
export async function restoreNotebook(
  manager: EntityManager,
  by: string,
  notebook: NotebookEntity,
): Promise<void> {
  const { id, group, title } = notebook;
  if (notebook.deletedAt === null) throw conflict(`“${title}” is not in the bin.`);
  await manager.update(NotebookEntity, { id }, { deletedAt: null, deletedBy: null });
  const words = `took the notebook “${title}” out of the bin`;
  await recordAudit(manager, { group, by, verb: 'notebook.restored', words });
  await announce(manager, 'notebook.changed', { notebook: id });
}

/**
 * Takes away for good what has been in the bin for its time, with the members' remarks on it. What reviewers remarked on
 * its records stays, as the records do.
 */
export async function emptyBin(manager: EntityManager, now = new Date()): Promise<void> {
  const before = new Date(now.getTime() - binDays * 24 * 3600 * 1000);
  await manager.query(
    `with gone as (delete from notebook where deleted_at < $1 returning id)
     delete from remark where review is null and notebook in (select id from gone)`,
    [before],
  );
}
