import { complaintInWords } from '../cells/complaint.ts';
import { cellKinds } from '../cells/kind.ts';
import { isCellName } from '../cells/name.ts';
import { readJson } from '../json/parse.ts';
import { limits } from '../protocol/limits.ts';
import { type FileCell, type NotebookFile, notebookFile, notebookFormat } from './notebook-file.ts';

/** A notebook, or one sentence on why a text is none. */
export type FileReading =
  { readonly ok: true; readonly file: NotebookFile } | { readonly ok: false; readonly message: string };

const refused = (message: string): FileReading => ({ ok: false, message });

function member(value: unknown, key: string): unknown {
  return typeof value === 'object' && value !== null && Object.hasOwn(value, key)
    ? (value as Record<string, unknown>)[key]
    : undefined;
}

/** What is wrong before the schema is asked: whether it is a notebook file at all, and cells of unknown kinds. */
function firstLook(value: unknown): string | null {
  const format = member(value, 'format');
  if (format !== notebookFormat) {
    if (typeof format === 'string' && format.startsWith('stillroom-notebook/')) {
      return `The file has the format ${format}; this version reads ${notebookFormat}.`;
    }
    return `The file is no notebook: a notebook begins with "format": "${notebookFormat}".`;
  }
  const cells = member(value, 'cells');
  if (!Array.isArray(cells)) return 'The file has no list of cells under "cells".';
  if (cells.length > limits.cells) {
    return `The file has ${cells.length} cells; a notebook holds at most ${limits.cells}.`;
  }
  for (const [place, cell] of cells.entries()) {
    const kind = member(cell, 'kind');
    if (typeof kind === 'string' && !cellKinds.some((known) => known === kind)) {
      return `Cell ${place + 1} of the file is of a kind "${kind}" that this version does not know; there are ${cellKinds.join(', ')}.`;
    }
  }
  return null;
}

/** What no schema says: names and ids stand once, names are names, texts are of a size that can be kept. */
function secondLook(cells: readonly FileCell[]): string | null {
  const names = new Map<string, number>();
  const ids = new Map<string, number>();
  for (const [index, { id, kind, name, text }] of cells.entries()) {
    const place = index + 1;
    if (name === '' && kind !== 'prose') return `Cell ${place} of the file (${kind}) has no name.`;
    if (name !== '' && !isCellName(name)) {
      return `Cell ${place} of the file has the name "${name}"; a name is a letter, then letters, digits or _.`;
    }
    const sameName = name === '' ? undefined : names.get(name);
    if (sameName !== undefined) return `Cells ${sameName} and ${place} of the file are both called ${name}.`;
    const sameId = ids.get(id);
    if (sameId !== undefined) return `Cells ${sameId} and ${place} of the file both have the id "${id}".`;
    if (text.length > limits.cellText) {
      return `The text of cell ${place} has ${text.length} characters; at most ${limits.cellText} can be kept.`;
    }
    names.set(name, place);
    ids.set(id, place);
  }
  const keyed = cells.find(({ id, name }) => name === '' && names.has(id));
  return keyed === undefined
    ? null
    : `A cell without a name has the id "${keyed.id}", which is the name of another: their results could not be told apart.`;
}

/** Ids for cells that go without: c and the place, or the next number that no cell bears. */
function withIds(
  cells: readonly (Omit<FileCell, 'id'> & { readonly id?: string | undefined })[],
): FileCell[] {
  const taken = new Set(cells.flatMap(({ id }) => id ?? []));
  return cells.map((cell, index) => {
    let number = index + 1;
    while (cell.id === undefined && taken.has(`c${number}`)) number++;
    const id = cell.id ?? `c${number}`;
    taken.add(id);
    return { ...cell, id, name: cell.name.normalize('NFC') };
  });
}

/** Checks a parsed value as a notebook file; the message is a whole sentence for the person who gave the file. */
export function checkNotebookFile(value: unknown): FileReading {
  const early = firstLook(value);
  if (early !== null) return refused(early);
  const checked = notebookFile.safeParse(value);
  if (!checked.success) {
    const issue = checked.error.issues[0];
    return refused(
      issue === undefined ? 'The file is no notebook.' : complaintInWords(issue, value, 'The file'),
    );
  }
  const cells = withIds(checked.data.cells);
  const late = secondLook(cells);
  return late === null ? { ok: true, file: { ...checked.data, cells } } : refused(late);
}

/** Reads the text of a notebook file; never throws. */
export function readNotebookFile(text: string): FileReading {
  if (text.length > limits.notebookFile) {
    return refused(
      `The file has ${Math.ceil(text.length / 1024 / 1024)} MB; a notebook file has at most ${limits.notebookFile / 1024 / 1024} MB.`,
    );
  }
  if (text.trim() === '') return refused('The file is empty.');
  const json = readJson(text);
  if (!json.ok) {
    return refused(`The file is not JSON: line ${json.line}, column ${json.column}: ${json.message}`);
  }
  return checkNotebookFile(json.value);
}
