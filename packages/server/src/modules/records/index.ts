import { RecordEntity, RecordLinkEntity } from './entities/record.ts';

export { awaitStanding, freezeNotebook, readFreeze } from './commands/freeze.ts';
export { digestOfText, recordFormat } from './content.ts';
export type { RecordCell, RecordContent } from './content.ts';
export { sendRecordFile } from './download.ts';
export { RecordEntity } from './entities/record.ts';
export { recordsOfGroup, recordsOfNotebook } from './lists.ts';
export { loadRecord, publicTokenOf, readContentText, readRecordContent } from './load.ts';
export type { LoadedRecord } from './load.ts';
export { createRecords } from './module.ts';
export { presentRecord } from './record.presenter.ts';
export type { RecordReviews } from './record.presenter.ts';
export type { ReviewsOf } from './records.routes.ts';
export const recordEntities = [RecordEntity, RecordLinkEntity];
