import type { Repair } from './complaint.ts';

/** What a failure may say beside its message. */
export interface FailureDetail {
  readonly hint?: string | null;
  readonly repairs?: readonly Repair[];
  /** Follows from another error that is told already, and is itself not told. */
  readonly silent?: boolean;
}

/** Ends the reading of one part of the text (an item, a column, a statement); caught where that part began. */
export class Failure extends Error {
  readonly from: number;
  readonly to: number;
  readonly hint: string | null;
  readonly repairs: readonly Repair[];
  readonly silent: boolean;

  constructor(from: number, to: number, message: string, detail: FailureDetail = {}) {
    super(message);
    this.from = from;
    this.to = to;
    this.hint = detail.hint ?? null;
    this.repairs = detail.repairs ?? [];
    this.silent = detail.silent ?? false;
  }
}

/** A repair that puts `insert` in the place of a stretch of the text. */
export function makeIt(insert: string, from: number, to: number, shown = insert): Repair {
  return { label: `Make it ${shown}`, from, to, insert };
}
