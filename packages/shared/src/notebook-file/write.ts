import type { CellContent, NotebookContent } from '../document/layout.ts';
import { type NotebookFile, notebookFormat } from './notebook-file.ts';

/** A notebook as a file has it. Who holds a cell, and since when, stays behind: a file only says that it is held. */
export function notebookFileOf(content: NotebookContent): NotebookFile {
  return {
    format: notebookFormat,
    title: content.title,
    subject: content.subject,
    cells: content.cells.map(({ id, kind, name, text, settings, held }) => ({
      id,
      kind,
      name,
      text,
      settings: { ...settings },
      held: held !== null,
    })),
  };
}

/**
 * A file as the content of a document.
 *
 * @param holder who holds the cells that the file holds: whoever imports it, now
 */
export function contentOfFile(file: NotebookFile, holder: NonNullable<CellContent['held']>): NotebookContent {
  return {
    title: file.title,
    subject: file.subject,
    cells: file.cells.map(({ id, kind, name, text, settings, held }) => ({
      id,
      kind,
      name,
      text,
      settings,
      held: held ? holder : null,
    })),
  };
}

/** The text of a notebook file: JSON with two blanks of indent and a last line break. The inverse of reading it. */
export const writeNotebookFile = (file: NotebookFile): string => `${JSON.stringify(file, null, 2)}\n`;
