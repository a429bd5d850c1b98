import type { CellNotice, PlanNotice } from '@stillroom/shared/protocol';
import { computed, type ComputedRef, shallowReactive, shallowRef } from 'vue';

export interface Plan {
  /** What the planner last said of each cell. */
  readonly notices: ReadonlyMap<string, CellNotice>;
  /** Whether the planner has spoken at all. */
  readonly known: Readonly<{ value: boolean }>;
  /** Ids of the cells that draw on a cell. */
  readonly drawnOnBy: ComputedRef<ReadonlyMap<string, readonly string[]>>;
  apply(notice: PlanNotice): void;
  reset(): void;
}

/** The plan of a notebook as the server tells it: states, digests and which cell draws on which. */
export function usePlan(): Plan {
  const notices = shallowReactive(new Map<string, CellNotice>());
  const known = shallowRef(false);

  function apply(notice: PlanNotice): void {
    if (notice.whole) {
      const present = new Set(notice.cells.map((cell) => cell.id));
      for (const id of [...notices.keys()]) if (!present.has(id)) notices.delete(id);
    }
    for (const cell of notice.cells) notices.set(cell.id, cell);
    for (const id of notice.gone ?? []) notices.delete(id);
    known.value = true;
  }

  const drawnOnBy = computed(() => {
    const users = new Map<string, string[]>();
    for (const { id, draws } of notices.values())
      for (const source of draws) users.set(source, [...(users.get(source) ?? []), id]);
    return users;
  });

  return {
    notices,
    known,
    drawnOnBy,
    apply,
    reset() {
      notices.clear();
      known.value = false;
    },
  };
}
