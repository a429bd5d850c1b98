import { readFileSync } from 'node:fs';
import type { NotebookContent } from '@stillroom/shared/document';
import { contentOfFile, readNotebookFile } from '@stillroom/shared/notebook-file';

/** A notebook of the demo as content of a document. @throws where the file is not as it should be */
export function readDemoNotebook(name: string): NotebookContent {
  // Read from the sources by the built server too: the compiler copies no such files.
  const file = new URL(`../../src/demo/notebooks/${name}.stillroom.json`, import.meta.url);
  const read = readNotebookFile(readFileSync(file, 'utf8'));
  if (!read.ok) throw new Error(`${name}: ${read.message}`);
  return contentOfFile(read.file, { by: '', at: '' });
}
