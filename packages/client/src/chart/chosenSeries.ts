import { computed, type ComputedRef, shallowReactive } from 'vue';

/** Lines chosen to be drawn, cell by cell; a reader's choice, kept while the page is open. */
const choices = shallowReactive(new Map<string, ReadonlySet<string>>());

/** At most so many lines are drawn unless more are chosen: one for each plot colour. */
const atFirst = 6;

/** The lines that are drawn of a cell: the reader's choice, or the first six. */
export const useChosenSeries = (
  cell: () => string,
  names: () => readonly string[],
): ComputedRef<ReadonlySet<string>> =>
  computed(() => {
    const chosen = choices.get(cell());
    const kept = names().filter((name) => chosen?.has(name) === true);
    return new Set(kept.length > 0 ? kept : names().slice(0, atFirst));
  });

/** Chooses which lines of a cell are drawn. */
export function chooseSeries(cell: string, names: readonly string[]): void {
  choices.set(cell, new Set(names));
}
