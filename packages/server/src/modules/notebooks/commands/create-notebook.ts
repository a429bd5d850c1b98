import type { NotebookContent } from '@stillroom/shared/document';
import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { recordAudit } from '../../groups/index.ts';
import { openingOf } from '../opening.ts';
import { writeDocument } from '../document.ts';
import { NotebookEntity } from '../entities/notebook.ts';

interface NewNotebook {
  readonly group: string;
  readonly by: string;
  readonly content: NotebookContent;
}

/** Makes a notebook in a group, with what is in it. Its cells are computed once the transaction is committed. */
export async function createNotebook(
  manager: EntityManager,
  { group, by, content }: NewNotebook,
): Promise<NotebookEntity> {
  const { title, subject } = content;
  const notebook = await manager.save(
    manager.create(NotebookEntity, {
      group,
      title,
      subject,
      opening: openingOf(content),
      createdBy: by,
      lastWorkBy: by,
    }),
  );
  await writeDocument(manager, notebook.id, content);
  await recordAudit(manager, { group, by, verb: 'notebook.created', words: `began the notebook “${title}”` });
  if (content.cells.length > 0) await announce(manager, 'notebook.created', { notebook: notebook.id });
  return notebook;
}
