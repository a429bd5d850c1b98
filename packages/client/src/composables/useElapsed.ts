import { computed, type ComputedRef, onScopeDispose, ref, watch } from 'vue';

/** Seconds since a moment, told anew while it is set; null while it is not. */
export function useElapsed(since: () => string | undefined): ComputedRef<number | null> {
  const now = ref(Date.now());
  let timer: ReturnType<typeof setInterval> | undefined;
  const stop = () => clearInterval(timer);

  watch(
    since,
    (begun) => {
      stop();
      if (begun === undefined) return;
      now.value = Date.now();
      timer = setInterval(() => (now.value = Date.now()), 500);
    },
    { immediate: true },
  );
  onScopeDispose(stop);

  return computed(() => {
    const begun = since();
    // The server's clock may be ahead of this machine's.
    return begun === undefined ? null : Math.max(0, (now.value - Date.parse(begun)) / 1000);
  });
}
