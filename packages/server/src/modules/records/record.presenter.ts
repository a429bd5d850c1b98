import type { RecordView, RemarkView, ReviewSummary } from '@stillroom/shared/contracts';
import { abilitiesOf, type Standing } from '@stillroom/shared/roles';
import type { EntityManager } from 'typeorm';
import type { RecordEntity } from './entities/record.ts';
import { readRecordContent } from './load.ts';

/** What only members see of a record: what came back on it, and its public address. */
export interface RecordReviews {
  readonly reviews: readonly ReviewSummary[];
  readonly remarks: readonly RemarkView[];
  readonly publicLink?: string | null;
}

/** A record as someone of this standing may see it. */
export async function presentRecord(
  manager: EntityManager,
  record: RecordEntity,
  standing: Standing,
  forMembers: RecordReviews = { reviews: [], remarks: [] },
): Promise<RecordView> {
  const content = await readRecordContent(manager, record.id);
  return {
    id: record.id,
    number: record.number,
    title: content.title,
    subject: content.subject,
    group: content.group,
    notebook: record.notebook,
    authors: content.authors,
    frozenAt: content.frozenAt,
    frozenBy: content.frozenBy,
    engine: content.engine,
    digest: record.digest,
    reasons: content.reasons,
    cells: content.cells,
    abilities: abilitiesOf(standing),
    ...forMembers,
  };
}
