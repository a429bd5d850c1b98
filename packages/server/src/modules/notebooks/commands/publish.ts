import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { newToken } from '../../auth/index.ts';
import { recordAudit } from '../../groups/index.ts';
import { NotebookEntity } from '../entities/notebook.ts';

/** Opens the fair copy to everybody who has the link, or closes it: a link that was closed never opens again. */
export async function publishNotebook(
  manager: EntityManager,
  by: string,
  notebook: NotebookEntity,
  open: boolean,
): Promise<NotebookEntity> {
  const { id, group, title } = notebook;
  if ((notebook.publicToken !== null) === open) return notebook;
  const publicToken = open ? newToken() : null;
  await manager.update(NotebookEntity, { id }, { publicToken });
  const words = `${open ? 'opened' : 'closed'} the public copy of “${title}”`;
  await recordAudit(manager, { group, by, verb: 'notebook.published', words });
  await announce(manager, 'notebook.changed', { notebook: id });
  return Object.assign(notebook, { publicToken });
}
