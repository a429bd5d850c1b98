import { afterPress } from './afterPress.ts';
import { nextTick, shallowRef, type ShallowRef } from 'vue';

export interface Selection {
  readonly selected: Readonly<ShallowRef<string | null>>;
  /** Selects a cell without moving the page or the focus. */
  select(id: string | null): void;
  /** Selects a cell, brings it into view and puts the focus on its slip, or into its Workings. */
  goTo(id: string, into?: 'slip' | 'workings'): void;
}

/** Element ids by which the parts of a cell find each other on the page. */
export const cellElement = (id: string) => `cell-${id}`;
export const slipElement = (id: string) => `slip-${id}`;

/** The first thing one can type into in the Workings of a cell; null while its editor is still being made. */
function firstField(cell: Element): HTMLElement | null {
  const editor = cell.querySelector('.wk .text-editor');
  if (editor !== null) return editor.querySelector<HTMLElement>('.cm-content');
  return cell.querySelector<HTMLElement>('.wk .stick :is(input, select, textarea, [tabindex="0"], button)');
}

/** Tries for about a second, frame by frame: a cell just sewn in has yet to be made. */
function whenThere(attempt: () => boolean, frames = 60): void {
  if (attempt() || frames === 0) return;
  requestAnimationFrame(() => whenThere(attempt, frames - 1));
}

/** Goes into what is typed in a cell: its Workings, or the prose on its right page. */
function enter(id: string): boolean {
  const cell = document.getElementById(cellElement(id));
  if (cell === null) return false;
  if (cell.classList.contains('kind-prose')) {
    const prose = cell.querySelector('[data-write]');
    prose?.dispatchEvent(new CustomEvent('prose-write'));
    return prose !== null;
  }
  const field = firstField(cell);
  field?.focus({ preventScroll: true });
  return field !== null;
}

/** Which cell is selected; `on` hears of it, so that co-authors can see where one is. */
export function useSelection(on: (id: string | null) => void): Selection {
  const selected = shallowRef<string | null>(null);

  let wanted: string | null = null;
  function select(id: string | null): void {
    wanted = id;
    // What stands beneath the selected cell's form comes and goes with it, and moves all below.
    afterPress(() => {
      if (selected.value === wanted) return;
      selected.value = wanted;
      on(wanted);
    });
  }

  return {
    selected,
    select,
    goTo(id, into = 'slip') {
      select(id);
      void nextTick(() => {
        document.getElementById(cellElement(id))?.scrollIntoView({ block: 'nearest', behavior: 'instant' });
        document.getElementById(slipElement(id))?.focus({ preventScroll: true });
        if (into === 'workings') whenThere(() => enter(id));
      });
    },
  };
}
