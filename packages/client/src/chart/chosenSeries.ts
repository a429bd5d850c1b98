import { computed, type ComputedRef, shallowReactive } from 'vue';
import type { Series } from './series.ts';

/** Lines chosen to be drawn, cell by cell; a reader's choice, kept while the page is open. */
const choices = shallowReactive(new Map<string, ReadonlySet<string>>());

/** At most so many lines are drawn unless more are chosen: one for each plot colour. */
const atFirst = 6;

const largest = (values: readonly (number | null)[]) =>
  values.reduce<number>((most, value) => Math.max(most, Math.abs(value ?? 0)), 0);

/** The first six lines that rise from the axis at all; the first six where none does. */
export function tellingLines(all: readonly Series[]): readonly string[] {
  const sizes = all.map(({ values }) => largest(values));
  const least = Math.max(...sizes, 0) * 0.02;
  const telling = all.filter((_, i) => (sizes[i] ?? 0) > least);
  return (telling.length > 0 ? telling : all).slice(0, atFirst).map(({ name }) => name);
}

/** The lines that are drawn of a cell: the reader's choice, or those that tell something. */
export const useChosenSeries = (
  cell: () => string,
  all: () => readonly Series[],
): ComputedRef<ReadonlySet<string>> =>
  computed(() => {
    const chosen = choices.get(cell());
    const kept = all().flatMap(({ name }) => (chosen?.has(name) === true ? [name] : []));
    return new Set(kept.length > 0 ? kept : tellingLines(all()));
  });

/** Chooses which lines of a cell are drawn. */
export function chooseSeries(cell: string, names: readonly string[]): void {
  choices.set(cell, new Set(names));
}
