import type { NotebookView } from '@stillroom/shared/contracts';
import { abilitiesOf } from '@stillroom/shared/roles';
import type { EntityManager } from 'typeorm';
import { type Config, publicAddress } from '../../config/index.ts';
import { GroupEntity } from '../groups/index.ts';
import type { LoadedNotebook } from './load.ts';

/** Records frozen from a notebook, supplied by the module that comes after this one. */
export type RecordsOf = (manager: EntityManager, notebook: string) => Promise<NotebookView['records']>;

/** A notebook as one of its readers may see it, beside its live document. */
export async function presentNotebook(
  manager: EntityManager,
  config: Config,
  recordsOf: RecordsOf,
  { notebook, role }: LoadedNotebook,
): Promise<NotebookView> {
  const { id, name, hue } = await manager.findOneByOrFail(GroupEntity, { id: notebook.group });
  return {
    id: notebook.id,
    title: notebook.title,
    group: { id, name, hue },
    role,
    abilities: abilitiesOf(role),
    publicLink:
      notebook.publicToken === null ? null : `${publicAddress(config)}/read/${notebook.publicToken}`,
    records: await recordsOf(manager, notebook.id),
  };
}
