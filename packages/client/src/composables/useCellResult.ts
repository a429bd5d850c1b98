import { computed, type ComputedRef, shallowRef, watch, watchEffect } from 'vue';
import type { Notebook } from './useNotebook.ts';
import type { Kept } from './useResults.ts';

export interface CellResult {
  /** The result to show; the one before it while the next is on its way. Undefined where there is none yet. */
  readonly result: ComputedRef<unknown>;
  readonly warnings: ComputedRef<readonly string[]>;
  /** Nothing to show yet, but it is coming. */
  readonly loading: ComputedRef<boolean>;
  /** The result should be there and could not be had. */
  readonly lost: ComputedRef<string | null>;
  again(): void;
}

/** The result of one cell, fetched once `wanted`; what is shown never goes blank between two results. */
export function useCellResult(notebook: Notebook, cell: () => string, wanted: () => boolean): CellResult {
  const digest = computed(() => notebook.plan.notices.get(cell())?.shown ?? null);
  const kept = computed(() =>
    digest.value === null ? undefined : notebook.results.byDigest.get(digest.value),
  );
  const held = shallowRef<Extract<Kept, { state: 'here' }> | null>(null);

  watchEffect(() => {
    if (wanted() && digest.value !== null && kept.value === undefined) notebook.results.ask(digest.value);
  });
  watch(
    [kept, digest],
    () => {
      if (kept.value?.state === 'here') held.value = kept.value;
      else if (digest.value === null && notebook.plan.notices.has(cell())) held.value = null;
    },
    { immediate: true, flush: 'sync' },
  );

  return {
    result: computed(() => held.value?.result),
    warnings: computed(() => held.value?.warnings ?? []),
    loading: computed(
      () => held.value === null && (!notebook.plan.known.value || kept.value?.state === 'asked'),
    ),
    lost: computed(() => (kept.value?.state === 'lost' ? kept.value.words : null)),
    again: () => {
      if (digest.value !== null) notebook.results.ask(digest.value);
    },
  };
}
