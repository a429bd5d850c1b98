import type { AuditEntry, AuditPage } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';
import { findPeople, presentPerson } from '../auth/index.ts';
import { AuditEntity } from './entities/audit.ts';

/** Everything the trail knows, by what was done. */
export type AuditVerb =
  | 'group.created'
  | 'group.renamed'
  | 'group.handed-over'
  | 'member.invited'
  | 'member.joined'
  | 'member.changed'
  | 'member.removed'
  | 'member.left'
  | 'invitation.withdrawn'
  | 'letter.shown'
  | 'notebook.created'
  | 'notebook.deleted'
  | 'notebook.restored'
  | 'notebook.published'
  | 'record.frozen'
  | 'record.published'
  | 'review.invited'
  | 'review.withdrawn'
  | 'review.returned';

interface AuditLine {
  readonly group: string;
  /** Null where nobody with an account did it: a reviewer, the installation itself. */
  readonly by: string | null;
  readonly verb: AuditVerb;
  /** A sentence without the person: "invited s.quillane@maltings.example as an author". */
  readonly words: string;
}

/** Adds a line to the group's trail, in the transaction of what it tells of. */
export async function recordAudit(manager: EntityManager, line: AuditLine): Promise<void> {
  await manager.insert(AuditEntity, line);
}

const pageSize = 50;

/** The lines before `before` (the newest where undefined), newest first. */
export async function readAudit(
  manager: EntityManager,
  group: string,
  before: string | undefined,
): Promise<AuditPage> {
  const query = manager
    .createQueryBuilder(AuditEntity, 'line')
    .where('line.group = :group', { group })
    .orderBy('line.id', 'DESC')
    .take(pageSize + 1);
  if (before !== undefined) query.andWhere('line.id < :before', { before });
  const lines = await query.getMany();
  const entries = await presentLines(manager, lines.slice(0, pageSize));
  return { entries, more: lines.length > pageSize };
}

/** The whole trail as CSV (RFC 4180), oldest first. */
export async function auditAsCsv(manager: EntityManager, group: string): Promise<string> {
  const lines = await manager.find(AuditEntity, { where: { group }, order: { id: 'ASC' } });
  const entries = await presentLines(manager, lines);
  const rows = entries.map(({ at, by, verb, words }) => [at, by?.name ?? '', verb, words]);
  return [['at', 'by', 'what', 'words'], ...rows].map((row) => row.map(csvField).join(',') + '\r\n').join('');
}

/** Quotes where needed; a leading sign that a spreadsheet would run as a formula is defused. */
export function csvField(value: string): string {
  const safe = /^[=+\-@\t\r]/u.test(value) ? `'${value}` : value;
  return /[",\r\n]/u.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

async function presentLines(manager: EntityManager, lines: readonly AuditEntity[]): Promise<AuditEntry[]> {
  const people = await findPeople(
    manager,
    lines.flatMap(({ by }) => by ?? []),
  );
  return lines.map(({ id, at, by, verb, words }) => {
    const person = by === null ? undefined : people.get(by);
    return { id, at: at.toISOString(), by: person === undefined ? null : presentPerson(person), verb, words };
  });
}
