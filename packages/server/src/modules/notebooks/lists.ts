import type { GroupView } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';
import { NotebookEntity } from './entities/notebook.ts';

/** Notebooks of a group by title, those in the bin too. */
export async function notebooksOfGroup(
  manager: EntityManager,
  group: string,
): Promise<GroupView['notebooks']> {
  const notebooks = await manager.find(NotebookEntity, { where: { group }, order: { title: 'ASC' } });
  return notebooks.map(({ id, title, deletedAt }) => ({
    id,
    title,
    deletedAt: deletedAt?.toISOString() ?? null,
  }));
}
