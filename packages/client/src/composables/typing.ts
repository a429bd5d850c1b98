import { computed, type ComputedRef, onScopeDispose, shallowRef, watch } from 'vue';

/** When the last key went down on this page, in milliseconds of `performance.now()`. */
let lastKey = Number.NEGATIVE_INFINITY;

addEventListener('keydown', () => (lastKey = performance.now()), { capture: true, passive: true });

/** Milliseconds since a key went down on this page; infinite before the first one. */
export const sinceLastKey = (): number => performance.now() - lastKey;

/** Milliseconds without a key after which a failure of what one is writing is shown: some words are only half written. */
const rest = 500;

/**
 * A state that turns as soon as it does, but into a failure only when one rests from typing: a row is wrong until it is
 * whole, and the page is not to turn grey and back with every word.
 */
export function useSettledFailure<State extends string>(state: () => State): ComputedRef<State> {
  const shown = shallowRef(state());
  let timer: ReturnType<typeof setTimeout> | undefined;

  function look(): void {
    const wait = state() === 'failed' ? rest - sinceLastKey() : 0;
    if (wait <= 0) shown.value = state();
    else timer = setTimeout(look, wait);
  }

  watch(
    state,
    () => {
      clearTimeout(timer);
      look();
    },
    { flush: 'sync' },
  );
  onScopeDispose(() => clearTimeout(timer));
  return computed(() => shown.value);
}
