import {
  type CellContent,
  cellOrder,
  cellsMap,
  notebookMap,
  readCell,
  readNotebook,
  type Subject,
} from '@stillroom/shared/document';
import { computed, type ComputedRef, onScopeDispose, shallowReactive, shallowRef, watch } from 'vue';
import type * as Y from 'yjs';
import type { LiveRoom } from '../live/room.ts';

export interface Cells {
  /** Every cell as plain data; an entry is replaced only when that cell changes. */
  readonly byId: ReadonlyMap<string, CellContent>;
  /** Ids in document order. */
  readonly order: Readonly<{ value: readonly string[] }>;
  readonly list: ComputedRef<readonly CellContent[]>;
  readonly idOf: ComputedRef<ReadonlyMap<string, string>>;
  readonly title: Readonly<{ value: string }>;
  readonly subject: Readonly<{ value: Subject }>;
}

/** The cells an event of the whole tree is about: the map itself (keys), or what lies below one cell (path). */
function changedCells(events: readonly Y.YEvent<Y.AbstractType<unknown>>[]): {
  ids: Set<string>;
  reordered: boolean;
} {
  const ids = new Set<string>();
  let reordered = false;
  for (const event of events) {
    const [cell] = event.path;
    if (typeof cell === 'string') {
      ids.add(cell);
      reordered ||= event.path.length === 1 && event.changes.keys.has('order');
    } else {
      for (const key of event.changes.keys.keys()) ids.add(key);
      reordered = true;
    }
  }
  return { ids, reordered };
}

/** Mirrors the document of a room as plain reactive data, cell by cell, so that a keystroke patches one cell only. */
export function useCells(room: Readonly<{ value: LiveRoom | null }>): Cells {
  const byId = shallowReactive(new Map<string, CellContent>());
  const order = shallowRef<readonly string[]>([]);
  const title = shallowRef('');
  const subject = shallowRef<Subject>('none');
  let release: () => void = () => undefined;

  function refresh(doc: Y.Doc, id: string): void {
    const cell = readCell(doc, id);
    if (cell === null) byId.delete(id);
    else byId.set(id, cell);
  }

  function attach(doc: Y.Doc): void {
    const cells = cellsMap(doc);
    const about = notebookMap(doc);
    const readAbout = () => {
      const now = readNotebook(doc);
      title.value = now.title;
      subject.value = now.subject;
    };
    const reorder = () => {
      const next = cellOrder(doc).filter((id) => byId.has(id));
      if (next.join() !== order.value.join()) order.value = next;
    };
    const onCells = (events: Y.YEvent<Y.AbstractType<unknown>>[]) => {
      const { ids, reordered } = changedCells(events);
      for (const id of ids) refresh(doc, id);
      if (reordered) reorder();
    };
    byId.clear();
    for (const id of cells.keys()) refresh(doc, id);
    reorder();
    readAbout();
    cells.observeDeep(onCells);
    about.observe(readAbout);
    release = () => {
      cells.unobserveDeep(onCells);
      about.unobserve(readAbout);
    };
  }

  watch(
    () => room.value,
    (next) => {
      release();
      release = () => undefined;
      if (next !== null) attach(next.doc);
    },
    { immediate: true },
  );
  onScopeDispose(() => release());

  const list = computed(() => order.value.flatMap((id) => byId.get(id) ?? []));
  const idOf = computed(
    () => new Map(list.value.filter((cell) => cell.name !== '').map((cell) => [cell.name, cell.id])),
  );
  return { byId, order, list, idOf, title, subject };
}
