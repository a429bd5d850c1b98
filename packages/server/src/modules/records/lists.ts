import type { GroupView, NotebookView } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';
import { RecordEntity } from './entities/record.ts';

/** Records of a group, newest first. */
export async function recordsOfGroup(manager: EntityManager, group: string): Promise<GroupView['records']> {
  const records = await manager.find(RecordEntity, { where: { group }, order: { number: 'DESC' } });
  return records.map(({ id, number, title, frozenAt }) => ({
    id,
    number,
    title,
    at: frozenAt.toISOString(),
  }));
}

/** Records frozen from a notebook, newest first. */
export async function recordsOfNotebook(
  manager: EntityManager,
  notebook: string,
): Promise<NotebookView['records']> {
  const records = await manager.find(RecordEntity, { where: { notebook }, order: { number: 'DESC' } });
  return records.map(({ id, number, frozenAt }) => ({ id, number, at: frozenAt.toISOString() }));
}
