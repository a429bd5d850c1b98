import type { CellSettings } from '../cells/cell.ts';
import type { CellKind } from '../cells/kind.ts';
import type { CellError } from '../protocol/messages.ts';

/** The part of a cell that a plan is made from; `CellContent` of a live document and the cells of a file have it. */
export interface PlannableCell {
  readonly id: string;
  readonly kind: CellKind;
  readonly name: string;
  readonly text: string;
  readonly settings: CellSettings;
}

/** A name under which a cell speaks of another. */
export interface NamedDraw {
  readonly name: string;
  readonly id: string;
  /** Whether its result is needed, or its source is enough (and it need not have been computed). */
  readonly reads: 'source' | 'result';
}

export interface PlannedCell {
  readonly id: string;
  readonly name: string;
  readonly kind: CellKind;
  /** The text as digested. */
  readonly text: string;
  /** The text as written, where it differs. */
  readonly written?: string;
  readonly settings: CellSettings;
  /** Ids of the cells it draws on, in order of first mention; names that nothing bears are left out. */
  readonly draws: readonly string[];
  readonly inputs: readonly NamedDraw[];
  /** "sha256:…"; null exactly where `problem` says why it cannot be computed. */
  readonly digest: string | null;
  readonly problem: CellError | null;
}

/** What a notebook computes: every cell with its digest, and an order in which each stands after what it draws on. */
export interface Plan {
  /** In document order. */
  readonly cells: readonly PlannedCell[];
  readonly byId: ReadonlyMap<string, PlannedCell>;
  /** Ids; cells that draw on each other in a circle stand where they are first met. */
  readonly order: readonly string[];
}
