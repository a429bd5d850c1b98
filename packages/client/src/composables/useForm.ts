import { RequestError, wordsOf } from '../api/client.ts';
import { reactive, ref } from 'vue';

/**
 * The sending of one form: busy while it runs, `failure` for the form as a whole, `fields` for complaints at single
 * fields. What was typed stays where it is.
 */
export function useForm() {
  const busy = ref(false);
  const failure = ref<string | null>(null);
  const fields = reactive<Record<string, string>>({});

  /** Runs `action`; true when it went through. */
  async function send(action: () => Promise<void>): Promise<boolean> {
    busy.value = true;
    failure.value = null;
    for (const key of Object.keys(fields)) delete fields[key];
    try {
      await action();
      return true;
    } catch (cause) {
      if (cause instanceof RequestError) Object.assign(fields, cause.fields);
      if (Object.keys(fields).length === 0) failure.value = wordsOf(cause);
      return false;
    } finally {
      busy.value = false;
    }
  }

  return { busy, failure, fields, send };
}
