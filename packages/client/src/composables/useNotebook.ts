import type { NotebookView } from '@stillroom/shared/contracts';
import type { CellContent } from '@stillroom/shared/document';
import type { CellState } from '@stillroom/shared/protocol';
import {
  computed,
  type ComputedRef,
  inject,
  type InjectionKey,
  provide,
  shallowRef,
  type ShallowRef,
} from 'vue';
import { RequestError, wordsOf } from '../api/client.ts';
import { fetchNotebook } from '../api/notebooks.ts';
import { numberCells } from '../components/notebook/numbering.ts';
import { useSession } from '../stores/session.ts';
import { standBesideWorkings } from './besideWorkings.ts';
import { useAbilities } from './useAbilities.ts';
import { type CellActions, useCellActions } from './useCellActions.ts';
import { type Cells, useCells } from './useCells.ts';
import { type ConnectionStatus, useConnectionStatus } from './useConnectionStatus.ts';
import { type LiveDocument, useLiveDocument } from './useLiveDocument.ts';
import { usePace } from './usePace.ts';
import { type Plan, usePlan } from './usePlan.ts';
import { type PresenceHere, usePresence } from './usePresence.ts';
import { type Remarks, useRemarks } from './useRemarks.ts';
import { type Results, useResults } from './useResults.ts';
import { type Selection, useSelection } from './useSelection.ts';
import { type Undo, useUndo } from './useUndo.ts';

/** Everything the parts of one open notebook share. */
export interface Notebook {
  readonly id: string;
  readonly about: Readonly<ShallowRef<NotebookView | null>>;
  /** Why the notebook could not be opened, in words. */
  readonly trouble: Readonly<ShallowRef<{ title: string; words: string } | null>>;
  readonly live: LiveDocument;
  readonly status: ComputedRef<ConnectionStatus>;
  readonly cells: Cells;
  readonly plan: Plan;
  readonly results: Results;
  readonly presence: PresenceHere;
  readonly remarks: Remarks;
  readonly abilities: ReturnType<typeof useAbilities>;
  readonly actions: CellActions;
  readonly undo: Undo;
  /** Settled once the server has said what one may do here, or could not. */
  readonly known: Promise<void>;
  /** Asks the server anew what this notebook is and what one may do in it. */
  refresh(): Promise<void>;
  readonly selection: Selection;
  /** The result a cell shows, where it is on this page. */
  resultOf(cell: string): unknown;
  /** "Scheme 1" … by cell id. */
  readonly numbers: ComputedRef<ReadonlyMap<string, string>>;
  /** State of a cell; `stale` until the planner has spoken of it. */
  stateOf(cell: Pick<CellContent, 'id' | 'kind'>): CellState;
}

const key: InjectionKey<Notebook> = Symbol('notebook');

const refusals: Readonly<Record<number, { title: string; words: string }>> = {
  403: {
    title: 'This notebook is not open to you',
    words:
      'It belongs to a group you are not in, or your part there is limited to other notebooks. A lead of the group can let you in.',
  },
  404: {
    title: 'No such notebook is open to you',
    words:
      'It belongs to a group you are not in, or it was deleted, or the link was cut short. A lead of the group can let you in; deleted notebooks rest in their group’s bin for 30 days.',
  },
};

/** Opens a notebook for the calling component and those below it. */
export function openNotebook(id: string): Notebook {
  const session = useSession();
  const about = shallowRef<NotebookView | null>(null);
  const trouble = shallowRef<{ title: string; words: string } | null>(null);
  const plan = usePlan();
  const results = useResults(id);
  const remarks = useRemarks(id);
  const pace = usePace();

  async function askAbout(): Promise<void> {
    try {
      about.value = await fetchNotebook(id);
      trouble.value = null;
    } catch (cause) {
      const status = cause instanceof RequestError ? cause.status : 0;
      // A lost line is told by the line itself; the document may be here from this machine.
      if (status !== 0)
        trouble.value = refusals[status] ?? {
          title: 'The notebook could not be opened',
          words: wordsOf(cause),
        };
    }
  }

  const known = askAbout();
  const live = useLiveDocument(id, session.me?.id ?? 'nobody', {
    plan(notice) {
      pace.take(() => {
        results.take(notice);
        plan.apply(notice);
      });
    },
    notice({ topic }) {
      if (topic === 'remarks') void remarks.refresh();
      else void askAbout();
    },
    refused: () => void askAbout(),
    // The server asks nobody for changes who may not make any: they would wait here for ever.
    returned: () =>
      void askAbout().then(() => {
        if (about.value?.abilities.includes('notebook.edit') === false) live.withdraw();
      }),
  });
  const cells = useCells(live.room);
  const resultOf = (cell: string): unknown => {
    const kept = results.byDigest.get(plan.notices.get(cell)?.shown ?? '');
    return kept?.state === 'here' ? kept.result : undefined;
  };
  const presence = usePresence(live.room, () => session.me);
  const notebook: Notebook = {
    id,
    about,
    trouble,
    live,
    status: useConnectionStatus(live.line),
    cells,
    plan,
    results,
    presence,
    remarks,
    abilities: useAbilities(() => about.value?.abilities ?? []),
    actions: useCellActions(id, live.room, cells, () => session.me?.name ?? '', resultOf),
    resultOf,
    undo: useUndo(live.room),
    known,
    refresh: askAbout,
    selection: useSelection((cell) => presence.moveTo(cell)),
    numbers: computed(() => numberCells(cells.list.value)),
    stateOf: (cell) => plan.notices.get(cell.id)?.state ?? (cell.kind === 'prose' ? 'current' : 'stale'),
  };
  void remarks.refresh();
  provide(key, notebook);
  standBesideWorkings();
  return notebook;
}

/** The open notebook; only below a component that opened one. */
export function useNotebook(): Notebook {
  const notebook = inject(key);
  if (notebook === undefined) throw new Error('No notebook is open here.');
  return notebook;
}
