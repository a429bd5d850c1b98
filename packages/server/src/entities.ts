import type { Entity } from './database/data-source.ts';
import { authEntities } from './modules/auth/index.ts';
import { fileEntities } from './modules/files/index.ts';
import { groupEntities } from './modules/groups/index.ts';
import { mailEntities } from './modules/mail/index.ts';
import { notebookEntities } from './modules/notebooks/index.ts';
import { recordEntities } from './modules/records/index.ts';
import { reviewEntities } from './modules/reviews/index.ts';

/** Every entity of every module. */
export const entities: readonly Entity[] = [
  ...fileEntities,
  ...mailEntities,
  ...authEntities,
  ...groupEntities,
  ...notebookEntities,
  ...recordEntities,
  ...reviewEntities,
];
