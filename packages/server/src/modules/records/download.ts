import type { Response } from 'express';
import type { EntityManager } from 'typeorm';
import { fileNameOf } from '../notebooks/index.ts';
import { recordFileText } from './content.ts';
import type { RecordEntity } from './entities/record.ts';
import { readContentText } from './load.ts';

/** Answers with a record as one JSON file, to be saved. */
export async function sendRecordFile(
  manager: EntityManager,
  response: Response,
  record: RecordEntity,
): Promise<void> {
  const text = recordFileText(record.digest, await readContentText(manager, record.id));
  const name = `${fileNameOf(record.title)}, record ${record.number}.json`;
  response.attachment(name).type('json').send(text);
}
