import { type Ability, type GroupRole, may } from '@stillroom/shared/roles';
import type { EntityManager } from 'typeorm';
import { gone, notFound } from '../../errors.ts';
import { authorize, roleAtNotebook } from '../groups/index.ts';
import { NotebookEntity } from './entities/notebook.ts';

export interface LoadedNotebook {
  readonly notebook: NotebookEntity;
  readonly role: GroupRole;
}

/**
 * The notebook and the person's role there, when they may do this.
 * @throws not-found, forbidden; gone where it is in the bin, unless that is what the ability is about.
 */
export async function loadNotebook(
  manager: EntityManager,
  person: string,
  id: string,
  ability: Ability,
): Promise<LoadedNotebook> {
  const notebook = await manager.findOneBy(NotebookEntity, { id });
  if (notebook === null) throw notFound('notebook');
  const role = await roleAtNotebook(manager, person, notebook.group, id);
  authorize(role, ability, 'notebook');
  if (notebook.deletedAt !== null && ability !== 'notebook.restore') {
    throw gone('This notebook is in the bin.', {
      hint: may(role, 'notebook.restore')
        ? 'Take it out again from the bin on the Shelf.'
        : 'A lead of the group can take it out again for 30 days.',
    });
  }
  return { notebook, role };
}

/**
 * The notebook whose fair copy a public link opens.
 * @throws gone
 */
export async function loadPublicNotebook(manager: EntityManager, token: string): Promise<NotebookEntity> {
  const notebook = await manager.findOneBy(NotebookEntity, { publicToken: token });
  if (notebook === null || notebook.deletedAt !== null) {
    throw gone('This link does not open anything (any more).', {
      hint: 'Ask whoever gave it to you; a group can close a public copy.',
    });
  }
  return notebook;
}
