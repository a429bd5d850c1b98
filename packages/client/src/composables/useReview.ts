import type { RerunView, ReviewView } from '@stillroom/shared/contracts';
import { onBeforeUnmount, ref, shallowRef } from 'vue';
import { wordsOf } from '../api/client.ts';
import * as api from '../api/records.ts';

/** How long to wait before asking again how far a rerun is, in milliseconds. */
const lookAgainAfter = 250;

/**
 * A reviewer's reading of one record: what the link opens, the reruns asked for, remarks. Reruns are fresh runs on the
 * server; nothing here changes the record.
 */
export function useReview(token: string) {
  const review = shallowRef<ReviewView | null>(null);
  const refused = ref<string | null>(null);
  const failure = ref<string | null>(null);
  const rerun = shallowRef<RerunView | null>(null);
  let timer: ReturnType<typeof setTimeout> | null = null;
  let gone = false;

  async function open(): Promise<void> {
    try {
      review.value = await api.openReview(token);
      rerun.value ??= review.value.rerun;
      if (rerun.value !== null && !rerun.value.done) follow(rerun.value.id, rerun.value);
      refused.value = null;
    } catch (cause) {
      refused.value = wordsOf(cause);
    }
  }

  /** Outcomes of earlier reruns stay in sight while a single cell is run again. */
  function show(next: RerunView, before: RerunView | null): void {
    rerun.value = { ...next, cells: { ...before?.cells, ...next.cells } };
  }

  function follow(id: string, before: RerunView | null): void {
    timer = setTimeout(async () => {
      try {
        const next = await api.fetchRerun(token, id);
        if (gone) return;
        show(next, before);
        if (!next.done) follow(id, before);
      } catch (cause) {
        failure.value = wordsOf(cause);
        if (!gone) follow(id, before);
      }
    }, lookAgainAfter);
  }

  async function run(cell?: string): Promise<void> {
    if (timer !== null) clearTimeout(timer);
    const before = cell === undefined ? null : rerun.value;
    try {
      failure.value = null;
      const begun = await api.rerun(token, cell);
      show(begun, before);
      if (!begun.done) follow(begun.id, before);
    } catch (cause) {
      failure.value = wordsOf(cause);
    }
  }

  async function remark(form: { cell: string; quote: string; text: string }): Promise<boolean> {
    try {
      failure.value = null;
      const written = await api.writeReviewRemark(token, form);
      if (review.value !== null)
        review.value = { ...review.value, remarks: [...review.value.remarks, written] };
      return true;
    } catch (cause) {
      failure.value = wordsOf(cause);
      return false;
    }
  }

  void open();
  onBeforeUnmount(() => {
    gone = true;
    if (timer !== null) clearTimeout(timer);
  });

  return { review, refused, failure, rerun, run, remark, open };
}
