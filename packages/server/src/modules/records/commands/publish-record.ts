import type { EntityManager } from 'typeorm';
import { newToken } from '../../auth/index.ts';
import { recordAudit } from '../../groups/index.ts';
import { type RecordEntity, RecordLinkEntity } from '../entities/record.ts';

/** Opens a record to everybody who has the link, or closes it. @returns the link's token, null where it is closed. */
export async function publishRecord(
  manager: EntityManager,
  by: string,
  record: RecordEntity,
  open: boolean,
): Promise<string | null> {
  const known = await manager.findOneBy(RecordLinkEntity, { record: record.id });
  if ((known !== null) === open) return known?.token ?? null;
  const token = open ? newToken() : null;
  if (token === null) await manager.delete(RecordLinkEntity, { record: record.id });
  else await manager.insert(RecordLinkEntity, { record: record.id, token });
  const words = `${open ? 'opened' : 'closed'} the public copy of record No. ${record.number}`;
  await recordAudit(manager, { group: record.group, by, verb: 'record.published', words });
  return token;
}
