import type { NotebookContent } from '@stillroom/shared/document';
import { type CellStanding, openingOf } from '../notebooks/index.ts';
import type { StandingCell } from './cell-state.ts';

/** Where the states of a notebook's cells are written down. */
export interface NotebookFile {
  read(notebook: string): Promise<{ readonly group: string; readonly states: readonly CellStanding[] }>;
  write(notebook: string, content: NotebookContent, states: readonly CellStanding[]): Promise<void>;
}

/** States are written this long after they changed, in milliseconds: only the last of a flurry matters. */
const pause = 400;

/** Writes down how the cells of one notebook stand, now and then while it is open and when it is put away. */
export class StateKeeper {
  readonly #file: NotebookFile;
  readonly #notebook: string;
  readonly #failed: (words: string, error: unknown) => void;
  #written = '';
  #pending: { content: NotebookContent; states: readonly CellStanding[] } | null = null;
  #timer: NodeJS.Timeout | null = null;
  #writing: Promise<void> = Promise.resolve();

  constructor(file: NotebookFile, notebook: string, failed: (words: string, error: unknown) => void) {
    this.#file = file;
    this.#notebook = notebook;
    this.#failed = failed;
  }

  /** What was written down last. */
  open(): Promise<{ readonly group: string; readonly states: readonly CellStanding[] }> {
    return this.#file.read(this.#notebook);
  }

  keep(content: NotebookContent, states: readonly CellStanding[]): void {
    this.#pending = { content, states };
    this.#timer ??= setTimeout(() => void this.flush(), pause).unref();
  }

  /** Writes what has changed, and resolves when it is written (or could not be, which is only reported). */
  flush(): Promise<void> {
    if (this.#timer !== null) clearTimeout(this.#timer);
    this.#timer = null;
    this.#writing = this.#writing.then(() => this.#write());
    return this.#writing;
  }

  async #write(): Promise<void> {
    const pending = this.#pending;
    this.#pending = null;
    if (pending === null) return;
    const { content, states } = pending;
    const now = JSON.stringify([content.title, content.subject, openingOf(content), states]);
    if (now === this.#written) return;
    try {
      await this.#file.write(this.#notebook, content, states);
      this.#written = now;
    } catch (error) {
      this.#failed('The states of cells could not be written down.', error);
    }
  }
}

/** A cell as it is written down. */
export function asState({ content, planned, known, notice }: StandingCell, place: number): CellStanding {
  const judged = planned.kind === 'claim' && known?.status === 'ok' && known.json !== null;
  return {
    cell: content.id,
    place,
    kind: planned.kind,
    name: planned.name,
    state: notice.state,
    digest: planned.digest,
    shown: notice.shown,
    error: notice.error ?? null,
    verdict: judged
      ? ((JSON.parse(known.json) as { verdict?: CellStanding['verdict'] }).verdict ?? null)
      : null,
  };
}
