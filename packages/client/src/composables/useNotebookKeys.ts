import { onBeforeUnmount, onMounted } from 'vue';
import type { Notebook } from './useNotebook.ts';

/** What the page does beyond the notebook itself. */
export interface PageActs {
  sewAfter(id: string): void;
  remark(id: string): void;
  toggleReading(): void;
  toggleWorkings(id: string): void;
  help(): void;
}

/** Landmarks that F6 goes round, as they stand on the page. */
const landmarks = ['.head', '#contents', '#spread', '.remarks'] as const;

function goRound(by: 1 | -1): void {
  const places = landmarks.flatMap((selector) => document.querySelector<HTMLElement>(selector) ?? []);
  const at = places.findIndex((place) => place.contains(document.activeElement));
  const next = places[(at + by + places.length) % places.length];
  if (next === undefined) return;
  const target = next.matches('[tabindex]')
    ? next
    : next.querySelector<HTMLElement>('a, button, input, [tabindex]');
  target?.focus();
}

type Act = (notebook: Notebook, page: PageActs, selected: string | null) => void;

const step =
  (by: 1 | -1): Act =>
  (notebook, _page, selected) => {
    const order = notebook.cells.order.value;
    const at = selected === null ? (by > 0 ? -1 : order.length) : order.indexOf(selected);
    const next = order[at + by];
    if (next !== undefined) notebook.selection.goTo(next);
  };

const move =
  (by: 1 | -1): Act =>
  (notebook, _page, selected) => {
    if (selected === null || !notebook.abilities.canEdit.value) return;
    notebook.actions.move(selected, by);
    notebook.selection.goTo(selected);
  };

const onSelected = (act: (notebook: Notebook, page: PageActs, id: string) => void): Act => {
  return (notebook, page, selected) => {
    if (selected !== null) act(notebook, page, selected);
  };
};

/**
 * Keys by what they do; "Ctrl" is Command on a Mac. None acts as a mode, none is Enter with a modifier, and typing
 * always types.
 */
const acts: Readonly<Record<string, Act>> = {
  'Alt ArrowUp': step(-1),
  'Alt ArrowDown': step(1),
  'Alt Shift ArrowUp': move(-1),
  'Alt Shift ArrowDown': move(1),
  F2: onSelected((notebook, _page, id) => notebook.selection.goTo(id, 'workings')),
  'Ctrl .': onSelected((notebook, _page, id) => notebook.abilities.canRun.value && notebook.actions.run(id)),
  'Ctrl Shift .': (notebook) => notebook.abilities.canRun.value && notebook.actions.runStale(),
  'Alt n': (notebook, page, selected) => {
    const after = selected ?? notebook.cells.order.value.at(-1);
    if (after !== undefined && notebook.abilities.canEdit.value) page.sewAfter(after);
  },
  'Ctrl \\': onSelected((_notebook, page, id) => page.toggleWorkings(id)),
  'Ctrl Shift \\': (_notebook, page) => page.toggleReading(),
  'Ctrl ;': onSelected((notebook, _page, id) => {
    const cell = notebook.cells.byId.get(id);
    if (cell !== undefined && cell.kind !== 'prose' && notebook.abilities.canEdit.value)
      notebook.actions.hold(id, cell.held === null);
  }),
  "Ctrl '": onSelected((notebook, page, id) => notebook.abilities.canRemark.value && page.remark(id)),
  F6: () => goRound(1),
  'Shift F6': () => goRound(-1),
  F1: (_notebook, page) => page.help(),
};

const mac = /Mac|iPhone|iPad/u.test(navigator.userAgent);

/** Taking back outside of any field: the fields and editors have it themselves. */
function undoes(event: KeyboardEvent, pressed: string, notebook: Notebook): boolean {
  const target = event.target;
  if (target instanceof HTMLElement && target.closest('input, textarea, select, .cm-editor') !== null)
    return false;
  if (pressed === 'Ctrl z') notebook.undo.undo();
  else if (pressed === 'Ctrl y' || pressed === 'Ctrl Shift Z') notebook.undo.redo();
  else return false;
  event.preventDefault();
  return true;
}

/** The name of a pressed combination: letters and signs by what they write, whatever Shift makes of them. */
export function combination(event: KeyboardEvent): string {
  const ctrl = mac ? event.metaKey : event.ctrlKey;
  const bySign: Readonly<Record<string, string>> = {
    Period: '.',
    Semicolon: ';',
    Quote: "'",
    Backslash: '\\',
    KeyN: 'n',
  };
  const sign = ctrl || event.altKey ? (bySign[event.code] ?? event.key) : event.key;
  return [ctrl && 'Ctrl', event.altKey && 'Alt', event.shiftKey && 'Shift', sign].filter(Boolean).join(' ');
}

/** Escape goes from within a cell back to its slip. The editors do so themselves; here it is for forms. */
function escape(event: KeyboardEvent, notebook: Notebook): void {
  const target = event.target;
  if (!(target instanceof HTMLElement) || event.defaultPrevented) return;
  const cell = target.closest<HTMLElement>('.cell[id^="cell-"]');
  if (cell === null || target.closest('.slip, .p-overlay-open, .cm-editor') !== null) return;
  notebook.selection.goTo(cell.id.slice('cell-'.length));
}

/** Listens for the notebook's keys while the page stands. */
export function useNotebookKeys(notebook: Notebook, page: PageActs): void {
  function onKey(event: KeyboardEvent): void {
    if (event.key === 'Escape') return escape(event, notebook);
    const pressed = combination(event);
    if (event.isComposing || undoes(event, pressed, notebook)) return;
    const act = acts[pressed];
    if (act === undefined) return;
    event.preventDefault();
    event.stopPropagation();
    act(notebook, page, notebook.selection.selected.value);
  }
  // Before the editors see the key: previous and next cell are the page's, wherever the caret is.
  onMounted(() => addEventListener('keydown', onKey, { capture: true }));
  onBeforeUnmount(() => removeEventListener('keydown', onKey, { capture: true }));
}
