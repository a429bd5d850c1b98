import { generateKeyBetween } from 'fractional-indexing';
import * as Y from 'yjs';
import { type CellKind, isCellKind } from '../cells/kind.ts';

/**
 * The live document of a notebook. Only this room knows the Yjs keys:
 *
 *   map "notebook": title (string), subject (string)
 *   map "cells":    id → map { kind, name, order (fractional index key), text (Y.Text), settings (Y.Map of JSON),
 *                              held ({ by, at } | null) }
 *
 * Cells are a map by id with an order key, never an array: moving must not lose what a co-author types meanwhile.
 * Every change carries an origin (`origins`).
 */
export const origins = { author: 'author', seed: 'seed', server: 'server' } as const;

export const subjects = ['none', 'clinical', 'public health', 'process safety', 'environment'] as const;
export type Subject = (typeof subjects)[number];

/** A cell of a document as plain data, in document order. */
export interface CellContent {
  readonly id: string;
  readonly kind: CellKind;
  readonly name: string;
  readonly text: string;
  readonly settings: Readonly<Record<string, unknown>>;
  readonly held: { readonly by: string; readonly at: string } | null;
}

export interface NotebookContent {
  readonly title: string;
  readonly subject: Subject;
  readonly cells: readonly CellContent[];
}

const aboutMap = (doc: Y.Doc) => doc.getMap<unknown>('notebook');

/** The cells as Yjs holds them, by id; for observers and editors that bind to `cellText`. */
export const cellsMap = (doc: Y.Doc): Y.Map<Y.Map<unknown>> => doc.getMap<Y.Map<unknown>>('cells');

/** The map that holds title and subject; for observers. */
export const notebookMap = aboutMap;

/** The text of a cell, to bind an editor to; undefined where the cell is gone. */
export function cellText(doc: Y.Doc, id: string): Y.Text | undefined {
  const text = cellsMap(doc).get(id)?.get('text');
  return text instanceof Y.Text ? text : undefined;
}

/** Ids in document order: by order key, ties (two people at once) by id. */
export function cellOrder(doc: Y.Doc): string[] {
  const keyed = [...cellsMap(doc)].map(([id, cell]) => ({ id, order: String(cell.get('order') ?? '') }));
  keyed.sort((a, b) => (a.order < b.order ? -1 : a.order > b.order ? 1 : a.id < b.id ? -1 : 1));
  return keyed.map(({ id }) => id);
}

/** One cell as plain data; null where it is gone or of a kind this version does not know. */
export function readCell(doc: Y.Doc, id: string): CellContent | null {
  const cell = cellsMap(doc).get(id);
  if (cell === undefined) return null;
  const kind = cell.get('kind');
  if (!isCellKind(kind)) return null;
  const settings = cell.get('settings');
  const held = cell.get('held') as CellContent['held'] | undefined;
  return {
    id,
    kind,
    name: String(cell.get('name') ?? ''),
    text: String(cell.get('text') ?? ''),
    settings: settings instanceof Y.Map ? (settings.toJSON() as Record<string, unknown>) : {},
    held: held ?? null,
  };
}

/** The whole document as plain data. */
export function readNotebook(doc: Y.Doc): NotebookContent {
  const subject = aboutMap(doc).get('subject');
  return {
    title: String(aboutMap(doc).get('title') ?? ''),
    subject: subjects.find((known) => known === subject) ?? 'none',
    cells: cellOrder(doc).flatMap((id) => readCell(doc, id) ?? []),
  };
}

/** Sets title or subject. */
export function writeAbout(doc: Y.Doc, about: { title?: string; subject?: Subject }, origin: string): void {
  doc.transact(() => {
    for (const [key, value] of Object.entries(about)) aboutMap(doc).set(key, value);
  }, origin);
}

/** An order key after the cell `after` (null: before all), and before what follows it. */
function orderAfter(doc: Y.Doc, after: string | null, moving?: string): string {
  const ids = cellOrder(doc).filter((id) => id !== moving);
  const at = after === null ? 0 : ids.indexOf(after) + 1;
  const key = (id: string | undefined) =>
    id === undefined ? null : String(cellsMap(doc).get(id)?.get('order'));
  const before = at > 0 ? key(ids[at - 1]) : null;
  const next = key(ids[at]);
  // Two cells may bear one key after a simultaneous insertion; then any key above the lower one will do.
  return generateKeyBetween(before, next !== null && before !== null && next <= before ? null : next);
}

/** Puts a new cell after another (null: first). The id must be new. */
export function addCell(
  doc: Y.Doc,
  cell: Omit<CellContent, 'held'> & { held?: CellContent['held'] },
  after: string | null,
  origin: string,
): void {
  doc.transact(() => {
    const map = new Y.Map<unknown>();
    const text = new Y.Text();
    if (cell.text !== '') text.insert(0, cell.text);
    const settings = new Y.Map<unknown>();
    for (const [key, value] of Object.entries(cell.settings)) settings.set(key, value);
    map.set('kind', cell.kind);
    map.set('name', cell.name);
    map.set('order', orderAfter(doc, after));
    map.set('text', text);
    map.set('settings', settings);
    map.set('held', cell.held ?? null);
    cellsMap(doc).set(cell.id, map);
  }, origin);
}

/** Moves a cell after another (null: first) by giving it a new order key. */
export function moveCell(doc: Y.Doc, id: string, after: string | null, origin: string): void {
  doc.transact(
    () =>
      cellsMap(doc)
        .get(id)
        ?.set('order', orderAfter(doc, after, id)),
    origin,
  );
}

/** Takes a cell out. */
export function deleteCell(doc: Y.Doc, id: string, origin: string): void {
  doc.transact(() => cellsMap(doc).delete(id), origin);
}

/** Gives a cell another name; uses of the old name are the caller's to follow. */
export function nameCell(doc: Y.Doc, id: string, name: string, origin: string): void {
  doc.transact(() => cellsMap(doc).get(id)?.set('name', name), origin);
}

/** Sets settings by key; `undefined` removes one. */
export function writeSettings(
  doc: Y.Doc,
  id: string,
  changes: Readonly<Record<string, unknown>>,
  origin: string,
): void {
  doc.transact(() => {
    const settings = cellsMap(doc).get(id)?.get('settings');
    if (!(settings instanceof Y.Map)) return;
    for (const [key, value] of Object.entries(changes)) {
      if (value === undefined) settings.delete(key);
      else settings.set(key, value);
    }
  }, origin);
}

/** Holds a cell at its present result, or releases it (null). */
export function holdCell(doc: Y.Doc, id: string, held: CellContent['held'], origin: string): void {
  doc.transact(() => cellsMap(doc).get(id)?.set('held', held), origin);
}

/** Fills an empty document from plain data. */
export function fillNotebook(doc: Y.Doc, content: NotebookContent, origin: string): void {
  doc.transact(() => {
    writeAbout(doc, { title: content.title, subject: content.subject }, origin);
    let after: string | null = null;
    for (const cell of content.cells) {
      addCell(doc, cell, after, origin);
      after = cell.id;
    }
  }, origin);
}
