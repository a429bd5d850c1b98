import type { CellState } from '@stillroom/shared/protocol';
import { onScopeDispose, ref, type Ref, watch } from 'vue';
import type { Notebook } from './useNotebook.ts';

/** Milliseconds over which changes are gathered into one announcement. */
const gathering = 2000;

/**
 * Words for the page's one polite live region: cells whose state changed, gathered over two seconds. The failure of
 * the cell one is in is told at once, assertively.
 */
export function useAnnouncements(notebook: Notebook): { polite: Ref<string>; assertive: Ref<string> } {
  const polite = ref('');
  const assertive = ref('');
  const before = new Map<string, CellState>();
  const changed = new Map<string, CellState>();
  let timer: ReturnType<typeof setTimeout> | undefined;

  function speak(): void {
    timer = undefined;
    const byState = new Map<CellState, string[]>();
    for (const [id, state] of changed) {
      const name = notebook.cells.byId.get(id)?.name;
      if (name !== undefined && name !== '') byState.set(state, [...(byState.get(state) ?? []), name]);
    }
    changed.clear();
    polite.value = [...byState].map(([state, names]) => `${names.join(', ')}: ${state}.`).join(' ');
  }

  const stop = watch(
    () => [...notebook.plan.notices.values()].map(({ id, state }) => [id, state] as const),
    (states) => {
      for (const [id, state] of states) {
        const was = before.get(id);
        before.set(id, state);
        if (was === undefined || was === state) continue;
        if (state === 'failed' && notebook.selection.selected.value === id) {
          const error = notebook.plan.notices.get(id)?.error;
          assertive.value = `${notebook.cells.byId.get(id)?.name ?? 'Cell'} failed. ${error?.message ?? ''}`;
        } else if (state !== 'working') changed.set(id, state);
      }
      if (changed.size > 0) timer ??= setTimeout(speak, gathering);
    },
  );
  onScopeDispose(() => {
    stop();
    clearTimeout(timer);
  });
  return { polite, assertive };
}
