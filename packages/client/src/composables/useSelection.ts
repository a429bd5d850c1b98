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

/** The first thing one can type into in the Workings of a cell. */
function firstField(cell: Element): HTMLElement | null {
  return (
    cell.querySelector<HTMLElement>('.cm-content') ??
    cell.querySelector<HTMLElement>('.wk input, .wk select, .wk textarea, .wk [tabindex="0"], .wk button')
  );
}

/** Which cell is selected; `on` hears of it, so that co-authors can see where one is. */
export function useSelection(on: (id: string | null) => void): Selection {
  const selected = shallowRef<string | null>(null);

  function select(id: string | null): void {
    if (selected.value === id) return;
    selected.value = id;
    on(id);
  }

  return {
    selected,
    select,
    goTo(id, into = 'slip') {
      select(id);
      void nextTick(() => {
        const cell = document.getElementById(cellElement(id));
        cell?.scrollIntoView({ block: 'nearest', behavior: 'instant' });
        const target = into === 'workings' && cell !== null ? firstField(cell) : null;
        (target ?? document.getElementById(slipElement(id)))?.focus({ preventScroll: true });
      });
    },
  };
}
