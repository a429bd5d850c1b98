import { type CellKind, cellRegistry, freshName, mapReferences } from '@stillroom/shared/cells';
import {
  addCell,
  type CellContent,
  cellText,
  deleteCell,
  holdCell,
  moveCell,
  nameCell,
  origins,
  writeAbout,
  writeSettings,
} from '@stillroom/shared/document';
import type { Subject } from '@stillroom/shared/document';
import { ref, type Ref, shallowRef } from 'vue';
import type * as Y from 'yjs';
import * as api from '../api/notebooks.ts';
import { wordsOf } from '../api/client.ts';
import type { LiveRoom } from '../live/room.ts';
import { renameUses } from '../live/renameUses.ts';
import { newCellSettings, type ResultOf } from './newCellSettings.ts';
import type { Cells } from './useCells.ts';

export interface CellActions {
  /** What the last request to the server came to, where it failed. */
  readonly trouble: Ref<string | null>;
  /** The cell taken out last, until it is put back or the next one goes. */
  readonly takenOut: Readonly<Ref<CellContent | null>>;
  putBack(): void;
  /** Sews in a cell after another (null: first) and gives its id. */
  add(
    kind: CellKind,
    after: string | null,
    content?: Partial<Pick<CellContent, 'text' | 'settings'>>,
  ): string;
  /** Sews in several cells at the end, as an outline gives them. */
  addAll(cells: readonly Pick<CellContent, 'kind' | 'name' | 'text' | 'settings'>[]): void;
  duplicate(id: string): string | null;
  remove(id: string): void;
  move(id: string, by: -1 | 1): void;
  /** Renames a cell and every use of its name, as one change. */
  rename(id: string, name: string): void;
  hold(id: string, held: boolean): void;
  setText(id: string, text: string): void;
  setSettings(id: string, changes: Readonly<Record<string, unknown>>): void;
  setAbout(about: { title?: string; subject?: Subject }): void;
  run(id: string): void;
  runStale(): void;
  stop(id: string): void;
}

/** Replaces the text of a Y.Text, touching only the part that differs. */
function replaceText(text: Y.Text, next: string): void {
  const now = text.toString();
  let start = 0;
  while (start < now.length && start < next.length && now[start] === next[start]) start++;
  let end = 0;
  while (
    end < now.length - start &&
    end < next.length - start &&
    now[now.length - 1 - end] === next[next.length - 1 - end]
  )
    end++;
  if (now.length - start - end > 0) text.delete(start, now.length - start - end);
  if (next.length - start - end > 0) text.insert(start, next.slice(start, next.length - end));
}

/** Everything an author does to cells. Each is one change of the document, so that undo takes back exactly that. */
export function useCellActions(
  notebook: string,
  room: Readonly<{ value: LiveRoom | null }>,
  cells: Cells,
  me: () => string,
  resultOf: ResultOf,
): CellActions {
  const trouble = ref<string | null>(null);
  const takenOut = shallowRef<CellContent | null>(null);
  let placeBefore: string | null = null;
  const doc = () => room.value?.doc ?? null;
  const names = () => cells.list.value.map(({ name }) => name);

  function change(work: (doc: Y.Doc) => void): void {
    const open = doc();
    if (open !== null) open.transact(() => work(open), origins.author);
  }

  function ask(request: Promise<void>): void {
    trouble.value = null;
    request.catch((cause: unknown) => (trouble.value = wordsOf(cause)));
  }

  function add(
    kind: CellKind,
    after: string | null,
    content: Partial<Pick<CellContent, 'text' | 'settings'>> = {},
  ): string {
    const id = crypto.randomUUID();
    const name = freshName(kind, names());
    const { text = cellRegistry[kind].empty.text, settings = newCellSettings(kind, after, cells, resultOf) } =
      content;
    change((open) => addCell(open, { id, kind, name, text, settings }, after, origins.author));
    return id;
  }

  return {
    trouble,
    add,
    addAll(given) {
      change((open) => {
        let after = cells.order.value.at(-1) ?? null;
        for (const cell of given) {
          const id = crypto.randomUUID();
          addCell(open, { ...cell, id }, after, origins.author);
          after = id;
        }
      });
    },
    duplicate(id) {
      const cell = cells.byId.get(id);
      if (cell === undefined) return null;
      return add(cell.kind, id, { text: cell.text, settings: cell.settings });
    },
    takenOut,
    remove(id) {
      const cell = cells.byId.get(id);
      if (cell === undefined) return;
      const before = cells.order.value[cells.order.value.indexOf(id) - 1] ?? null;
      change((open) => deleteCell(open, id, origins.author));
      takenOut.value = cell;
      placeBefore = before;
    },
    putBack() {
      const cell = takenOut.value;
      if (cell === null) return;
      const after = placeBefore !== null && cells.byId.has(placeBefore) ? placeBefore : null;
      change((open) => addCell(open, cell, after, origins.author));
      takenOut.value = null;
    },
    move(id, by) {
      const order = cells.order.value;
      const at = order.indexOf(id);
      const target = at + by;
      if (at < 0 || target < 0 || target >= order.length) return;
      const after = by > 0 ? order[target] : order[target - 1];
      change((open) => moveCell(open, id, after ?? null, origins.author));
    },
    rename(id, name) {
      const old = cells.byId.get(id)?.name;
      if (old === undefined || old === name) return;
      change((open) => {
        nameCell(open, id, name, origins.author);
        if (old === '') return;
        for (const cell of cells.list.value) {
          const settings = mapReferences(cellRegistry[cell.kind], cell.settings, (used) =>
            used === old ? name : used,
          );
          const moved = Object.entries(settings).filter(([key, value]) => value !== cell.settings[key]);
          if (moved.length > 0) writeSettings(open, cell.id, Object.fromEntries(moved), origins.author);
          const text = cellText(open, cell.id);
          for (const edit of renameUses(cell.kind, cell.text, old, name).reverse()) {
            text?.delete(edit.from, edit.to - edit.from);
            text?.insert(edit.from, edit.insert);
          }
        }
      });
    },
    hold(id, held) {
      const by = { by: me(), at: new Date().toISOString() };
      change((open) => holdCell(open, id, held ? by : null, origins.author));
    },
    setText(id, next) {
      change((open) => {
        const text = cellText(open, id);
        if (text !== undefined) replaceText(text, next);
      });
    },
    setSettings: (id, changes) => change((open) => writeSettings(open, id, changes, origins.author)),
    setAbout: (about) => change((open) => writeAbout(open, about, origins.author)),
    run: (id) => ask(api.runCell(notebook, id)),
    runStale: () => ask(api.runStale(notebook)),
    stop: (id) => ask(api.stopCell(notebook, id)),
  };
}
