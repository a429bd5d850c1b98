import type { TrialRequest } from '@stillroom/shared/contracts';
import { computed, type ComputedRef, shallowReactive } from 'vue';
import { wordsOf } from '../api/client.ts';
import { tryValues } from '../api/notebooks.ts';

/** Which values a trial changes: constants, and what a course starts from. */
export type TriedKind = 'constants' | 'start';

/** Values one person tries in a cell, for their eyes only: nothing of the notebook changes. */
export interface Trial {
  readonly constants: Readonly<Record<string, number>>;
  readonly start: Readonly<Record<string, number>>;
  /** What the cell comes to with the values last answered for; null until the first answer. */
  readonly result: unknown;
  /** Whether an answer for the newest values is on its way. */
  readonly asking: boolean;
  /** Why the newest values have no result. */
  readonly trouble: string | null;
}

/** A trial that takes longer than this, in milliseconds, is given up for newer values. */
const patience = 1200;

const empty: Trial = { constants: {}, start: {}, result: null, asking: false, trouble: null };
const trials = shallowReactive(new Map<string, Trial>());
const running = new Map<string, { readonly since: number; readonly control: AbortController }>();

const isEmpty = ({ constants, start }: Trial): boolean =>
  Object.keys(constants).length + Object.keys(start).length === 0;

/** The trial of a cell as its fair copy shows it; null where nothing is tried. */
export const useTrialOf = (cell: () => string): ComputedRef<Trial | null> =>
  computed(() => trials.get(cell()) ?? null);

/** Puts a trial aside: the cell shows what it is once more. */
export function liftTrial(cell: string): void {
  running.get(cell)?.control.abort();
  trials.delete(cell);
}

/** What a trial asks the server for: its values over those the cell's own settings give. */
export function trialBody(
  trial: Pick<Trial, 'constants' | 'start'>,
  settings: Readonly<Record<string, unknown>>,
): TrialRequest {
  const merged = (kind: TriedKind) => {
    if (Object.keys(trial[kind]).length === 0) return {};
    const own = settings[kind];
    return { [kind]: { ...(typeof own === 'object' && own !== null ? own : {}), ...trial[kind] } };
  };
  return { ...merged('constants'), ...merged('start') };
}

/** One question at a time; the values at its end are asked for next, if they have changed meanwhile. */
async function ask(
  notebook: string,
  cell: string,
  settings: () => Readonly<Record<string, unknown>>,
): Promise<void> {
  const before = running.get(cell);
  if (before !== undefined) {
    if (performance.now() - before.since > patience) before.control.abort();
    return;
  }
  const asked = trials.get(cell);
  if (asked === undefined) return;
  const control = new AbortController();
  running.set(cell, { since: performance.now(), control });
  const answer = await tryValues(notebook, cell, trialBody(asked, settings()), control.signal).then(
    (view) =>
      view.status === 'ok'
        ? { result: view.result, trouble: null }
        : { result: asked.result, trouble: view.error.message },
    (cause: unknown) => ({ result: asked.result, trouble: wordsOf(cause) }),
  );
  running.delete(cell);
  const now = trials.get(cell);
  if (now === undefined) return;
  const isNewest = now.constants === asked.constants && now.start === asked.start;
  if (isNewest) trials.set(cell, { ...now, ...answer, asking: false });
  else {
    // What came in between is shown while the newest is on its way: the figure follows the hand.
    if (!control.signal.aborted) trials.set(cell, { ...now, result: answer.result });
    await ask(notebook, cell, settings);
  }
}

/** Trying values in a cell. `settings` gives the cell's own, over which the trial's are put. */
export function useTrial(
  notebook: string,
  cell: () => string,
  settings: () => Readonly<Record<string, unknown>>,
) {
  const trial = useTrialOf(cell);
  const again = (next: Trial): void => {
    trials.set(cell(), { ...next, asking: true, trouble: null });
    void ask(notebook, cell(), settings);
  };
  return {
    trial,
    /** Tries a value; null goes back to the cell's own. */
    set(kind: TriedKind, name: string, value: number | null): void {
      const now = trial.value ?? empty;
      const { [name]: _, ...rest } = now[kind];
      const next = { ...now, [kind]: value === null ? rest : { ...rest, [name]: value } };
      if (isEmpty(next)) trials.delete(cell());
      else again(next);
    },
    /** Asks once more, as when what the cell stands on has changed. */
    again(): void {
      // Other values of the same content, so that an answer under way does not count as the newest.
      if (trial.value !== null) again({ ...trial.value, constants: { ...trial.value.constants } });
    },
    lift: () => liftTrial(cell()),
  };
}
