import { ref, shallowRef, type Ref, type ShallowRef } from 'vue';
import { wordsOf } from '../api/client.ts';

/** Something a page asked the server for: not here yet, here, or refused with words. */
export interface Asked<Value> {
  readonly value: ShallowRef<Value | null>;
  readonly failure: Ref<string | null>;
  readonly loading: Ref<boolean>;
  /** Asks again; the old value stays in sight meanwhile. */
  readonly again: () => Promise<void>;
}

/** Asks at once, and again on demand. */
export function useAsked<Value>(ask: () => Promise<Value>): Asked<Value> {
  const value = shallowRef<Value | null>(null);
  const failure = ref<string | null>(null);
  const loading = ref(true);
  async function again(): Promise<void> {
    loading.value = true;
    try {
      value.value = await ask();
      failure.value = null;
    } catch (cause) {
      failure.value = wordsOf(cause);
    } finally {
      loading.value = false;
    }
  }
  void again();
  return { value, failure, loading, again };
}
