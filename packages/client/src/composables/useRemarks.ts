import type { RemarkView } from '@stillroom/shared/contracts';
import { computed, type ComputedRef, shallowRef } from 'vue';
import { wordsOf } from '../api/client.ts';
import * as api from '../api/notebooks.ts';

export interface Remarks {
  readonly all: Readonly<{ value: readonly RemarkView[] }>;
  readonly byCell: ComputedRef<ReadonlyMap<string, readonly RemarkView[]>>;
  readonly open: ComputedRef<number>;
  /** What went wrong last; null when nothing did. */
  readonly trouble: Readonly<{ value: string | null }>;
  refresh(): Promise<void>;
  write(remark: { cell: string; quote: string; text: string }): Promise<boolean>;
  answer(remark: string, text: string): Promise<boolean>;
  settle(remark: string, settled: boolean): Promise<boolean>;
}

/** The margin remarks of one notebook. Writing gives false where it did not succeed, so that the text stays put. */
export function useRemarks(notebook: string): Remarks {
  const all = shallowRef<readonly RemarkView[]>([]);
  const trouble = shallowRef<string | null>(null);

  const put = (remark: RemarkView) => {
    const rest = all.value.filter(({ id }) => id !== remark.id);
    all.value = [...rest, remark].sort((a, b) => a.at.localeCompare(b.at));
  };

  async function attempt(work: () => Promise<void>): Promise<boolean> {
    try {
      await work();
      trouble.value = null;
      return true;
    } catch (cause) {
      trouble.value = wordsOf(cause);
      return false;
    }
  }

  const byCell = computed(() => {
    const cells = new Map<string, RemarkView[]>();
    for (const remark of all.value) cells.set(remark.cell, [...(cells.get(remark.cell) ?? []), remark]);
    return cells;
  });

  return {
    all,
    byCell,
    open: computed(() => all.value.filter(({ settled }) => settled === null).length),
    trouble,
    refresh: async () => {
      await attempt(async () => void (all.value = await api.fetchRemarks(notebook)));
    },
    write: (remark) => attempt(async () => put(await api.writeRemark(notebook, remark))),
    answer: (remark, text) => attempt(async () => put(await api.answerRemark(notebook, remark, text))),
    settle: (remark, settled) => attempt(async () => put(await api.settleRemark(notebook, remark, settled))),
  };
}
