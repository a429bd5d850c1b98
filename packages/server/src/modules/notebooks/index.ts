import { NotebookEntity } from './entities/notebook.ts';
import { RemarkAnswerEntity, RemarkEntity } from './entities/remark.ts';

export { loadDocument, readContent } from './document.ts';
export type { Queries } from './document.ts';
export { readRole } from './roles.ts';
export const notebookEntities = [NotebookEntity, RemarkEntity, RemarkAnswerEntity];
