import type { GroupView, NotebookView } from '@stillroom/shared/contracts';
import { type EntityManager, In } from 'typeorm';
import { RecordEntity } from './entities/record.ts';

/** Records of a group, newest first; only those of the chosen notebooks, where not all (null) count. */
export async function recordsOfGroup(
  manager: EntityManager,
  group: string,
  chosen: readonly string[] | null,
): Promise<GroupView['records']> {
  const where = chosen === null ? { group } : { group, notebook: In([...chosen]) };
  const records = await manager.find(RecordEntity, { where, order: { number: 'DESC' } });
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
