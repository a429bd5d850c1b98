import type { Ability, GroupRole } from '@stillroom/shared/roles';
import type { EntityManager } from 'typeorm';
import { gone, notFound } from '../../errors.ts';
import { authorize, roleAtNotebook } from '../groups/index.ts';
import type { RecordContent } from './content.ts';
import { RecordEntity, RecordLinkEntity } from './entities/record.ts';

export interface LoadedRecord {
  readonly record: RecordEntity;
  readonly role: GroupRole;
}

/**
 * The record and the person's role there (that at its notebook), when they may do this. Its content is not read.
 * @throws not-found, forbidden
 */
export async function loadRecord(
  manager: EntityManager,
  person: string,
  id: string,
  ability: Ability,
): Promise<LoadedRecord> {
  const record = await manager.findOneBy(RecordEntity, { id });
  if (record === null) throw notFound('record');
  const role = await roleAtNotebook(manager, person, record.group, record.notebook);
  authorize(role, ability, 'record');
  return { record, role };
}

/** The record that a public link opens. @throws gone */
export async function loadPublicRecord(manager: EntityManager, token: string): Promise<RecordEntity> {
  const link = await manager.findOneBy(RecordLinkEntity, { token });
  if (link === null) {
    throw gone('This link does not open a record (any more).', {
      hint: 'Ask whoever gave it to you; a group can close a public copy.',
    });
  }
  return manager.findOneByOrFail(RecordEntity, { id: link.record });
}

/** What a record says, as the text that was digested. */
export async function readContentText(manager: EntityManager, record: string): Promise<string> {
  const { content } = await manager.findOneOrFail(RecordEntity, {
    where: { id: record },
    select: { id: true, content: true },
  });
  return content;
}

/** What a record says. */
export async function readRecordContent(manager: EntityManager, record: string): Promise<RecordContent> {
  return JSON.parse(await readContentText(manager, record)) as RecordContent;
}

/** The token of a record's public link; null where it is closed. */
export async function publicTokenOf(manager: EntityManager, record: string): Promise<string | null> {
  return (await manager.findOneBy(RecordLinkEntity, { record }))?.token ?? null;
}
